namespace Pairwright.Runner.Execution;

/// <summary>Why and where a run ended before its last cell.</summary>
/// <param name="Sentence">One sentence that names the cell and says what to do.</param>
/// <param name="Cell">The cell that was running; null where none was.</param>
internal sealed record RunStop(string Sentence, CellRun? Cell)
{
    /// <summary>What a failed cell told of itself.</summary>
    public static RunStop ByFailure(CellRun cell, CellFailure failure, RunLimits limits)
    {
        var place = failure.Line is { } line ? $"{cell.Name}, line {line}" : cell.Name;
        var message = OneLine(failure.Message);
        return new RunStop(
            failure.Kind switch
            {
                CellFailureKind.UserError => $"{place}: {message}",
                CellFailureKind.NotCompiled => $"{place} does not compile: {failure.Name}: {WithStop(message)} Correct the cell and run again.",
                CellFailureKind.OutOfMemory => TooMuchMemory(cell, limits),
                _ => $"{place} failed: {failure.Name}: {WithStop(message)} Correct the cell or its input and run again.",
            },
            cell);
    }

    /// <summary>What the end of the process tells when no cell told it.</summary>
    public static RunStop ByEnd(CellRun? cell, ChildEnd end, RunLimits limits)
    {
        var running = cell is null ? "before the first cell began" : $"while {Lower(cell.Name)} was running";
        return new RunStop(
            end.Kind switch
            {
                ChildEndKind.OutOfTime => cell is null
                    ? $"The time limit of {limits.Time.TotalSeconds:0.#} s ran out before the first cell began; allow more with --time-limit."
                    : $"{cell.Name} was still running when the time limit of {limits.Time.TotalSeconds:0.#} s ran out; look for a loop in it that never ends, or allow more with --time-limit.",
                ChildEndKind.OutOfMemory => TooMuchMemory(cell, limits),
                ChildEndKind.Interrupted => $"The run was interrupted {running}; run it again to finish it.",
                _ => ByExit(cell, end, limits, running),
            },
            cell);
    }

    private static string ByExit(CellRun? cell, ChildEnd end, RunLimits limits, string running)
    {
        if (end.ErrorText.Contains("Out of memory", StringComparison.OrdinalIgnoreCase))
        {
            return TooMuchMemory(cell, limits);
        }
        return (end.ExitCode, cell) switch
        {
            (128 + 9, _) => $"The system killed the process {running}, most likely because the machine ran out of memory; work on fewer or smaller pictures at a time.",
            (> 128 and < 128 + 65, _) when end.ErrorText.Contains("Stack overflow", StringComparison.OrdinalIgnoreCase) =>
                $"The process crashed {running}: a method calls itself without end; correct it and run again.",
            (> 128 and < 128 + 65, _) => $"The process crashed {running} (signal {end.ExitCode - 128}{FirstError(end)}); the report holds what it printed last.",
            (_, null) => $"The process that runs the cells ended {running} (exit code {end.ExitCode}{FirstError(end)}); run it again, and report this if it comes back.",
            _ => $"{cell.Name} ended the process itself (exit code {end.ExitCode}); take out the call that does, such as Environment.Exit.",
        };
    }

    private static string TooMuchMemory(CellRun? cell, RunLimits limits) =>
        $"{cell?.Name ?? "The kernel"} needed more memory than the limit of {limits.MemoryMb} MB; work on fewer or smaller pictures at a time, or allow more with --memory-limit.";

    private static string FirstError(ChildEnd end)
    {
        var line = end.ErrorText.Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries).FirstOrDefault();
        return line is null ? "" : $": {line}";
    }

    private static string Lower(string name) => char.ToLowerInvariant(name[0]) + name[1..];

    private static string OneLine(string text) =>
        string.Join(' ', text.Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries));

    private static string WithStop(string text) => text.Length > 0 && text[^1] is '.' or '!' or '?' ? text : text + ".";
}
