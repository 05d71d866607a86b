namespace Pairwright;

/// <summary>One step that led to a result, with its settings.</summary>
/// <param name="Name">What was done, as a verb or a method's name.</param>
/// <param name="Settings">The settings, as short readable text.</param>
public sealed record ProvenanceStep(string Name, string Settings);
