namespace Pairwright.Runner.Execution;

/// <summary>A verdict and the cell that was running when it was made.</summary>
internal sealed record RunVerdict(VerdictRecord Record, CellRun? Cell);
