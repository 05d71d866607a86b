namespace Pairwright.Matching;

/// <summary>One setting of a stage.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Value">Its value as text, with a point as decimal mark.</param>
public sealed record StageSetting(string Name, string Value);
