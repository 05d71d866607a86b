namespace Pairwright.Runner.Execution;

/// <summary>One code cell of a job.</summary>
/// <param name="Label">What stack traces and compiler messages call it: a number, or a word.</param>
/// <param name="Code">The code as it stands in the notebook.</param>
internal sealed record JobCell(string Label, string Code);
