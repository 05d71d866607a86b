using System.Text.Json;

namespace Pairwright.Runner.Execution;

/// <summary>What the parent asks of the child process: code to run in order, in one kernel.</summary>
/// <param name="Folder">The working directory: the notebook's folder.</param>
/// <param name="Cells">The code cells in order.</param>
internal sealed record CellJob(string Folder, IReadOnlyList<JobCell> Cells)
{
    public string ToLine() => JsonSerializer.Serialize(this);

    public static CellJob FromLine(string line) =>
        JsonSerializer.Deserialize<CellJob>(line) ?? throw new InvalidDataException("The job line is empty.");
}
