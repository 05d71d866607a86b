namespace Pairwright.Runner.Execution;

/// <summary>How the child process came to its end.</summary>
/// <param name="Kind">The sort of end.</param>
/// <param name="ExitCode">Its exit code; 128 + n where signal n ended it.</param>
/// <param name="ErrorText">What it printed on its own standard error, outside any cell's output: the beginning and the end.</param>
internal sealed record ChildEnd(ChildEndKind Kind, int ExitCode, string ErrorText);
