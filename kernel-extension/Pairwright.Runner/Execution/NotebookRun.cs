using Pairwright.Runner.Documents;

namespace Pairwright.Runner.Execution;

/// <summary>One run of one notebook: everything that the reports are made from, as far as it has come.</summary>
internal sealed class NotebookRun
{
    private readonly List<CellRun> _cells = [];
    private readonly List<RunVerdict> _verdicts = [];
    private CellRun? _current;

    /// <exception cref="BadUsageException">A code cell is in another language than C#.</exception>
    public NotebookRun(NotebookDocument document, IReadOnlyList<KeyValuePair<string, string>> parameters, RunLimits limits)
    {
        Document = document;
        Parameters = parameters;
        Limits = limits;
        Name = Path.GetFileNameWithoutExtension(document.Path);
        string? heading = null;
        var number = 0;
        foreach (var cell in document.Cells)
        {
            if (cell.IsMarkdown)
            {
                heading = NotebookDocument.FirstHeading(cell) ?? heading;
            }
            if (cell.IsCode)
            {
                _cells.Add(new CellRun(cell, cell.IsInjected ? null : ++number, heading ?? FirstLine(cell.Source)));
                heading = null;
            }
        }
        RequireCSharpCells();
    }

    public NotebookDocument Document { get; }

    /// <summary>The file's name without its ending; the reports carry it too.</summary>
    public string Name { get; }

    public IReadOnlyList<KeyValuePair<string, string>> Parameters { get; }

    public RunLimits Limits { get; }

    public IReadOnlyList<CellRun> Cells => _cells;

    public IReadOnlyList<RunVerdict> Verdicts => _verdicts;

    public DateTimeOffset Started { get; } = DateTimeOffset.Now;

    /// <summary>When the run ended; null while it goes on.</summary>
    public DateTimeOffset? Ended { get; private set; }

    /// <summary>Why the run ended before its last cell; null when it did not.</summary>
    public RunStop? Stop { get; private set; }

    public int ExitCode =>
        Stop is not null || Ended is null ? Runner.ExitCode.Stopped
        : _verdicts.TrueForAll(verdict => verdict.Record.Outcome == VerdictRecord.Met) ? Runner.ExitCode.AllMet
        : Runner.ExitCode.NotAllMet;

    /// <summary>Runs all cells in a child process.</summary>
    /// <param name="changed">Told after each step that a report or a terminal would show; the cell is null where none is meant.</param>
    /// <param name="clock">What the time limit is measured with.</param>
    /// <param name="interrupt">Ends the run early.</param>
    public async Task RunAsync(Action<ChildMessageKind, CellRun?> changed, TimeProvider clock, CancellationToken interrupt)
    {
        var job = new CellJob(
            Path.GetDirectoryName(Document.Path)!,
            [.. _cells.Select(run => new JobCell(run.Label, run.Cell.Source))]);
        var finished = false;

        var end = await ChildProcess.RunAsync(
            job,
            Limits,
            message =>
            {
                finished |= message.Kind == ChildMessageKind.Finished;
                var cell = Take(message);
                changed(message.Kind, cell);
            },
            clock,
            interrupt);

        if (!finished && Stop is null)
        {
            var running = _current is { State: CellState.Running } ? _current : null;
            Stop = RunStop.ByEnd(running, end, Limits);
            running?.AddError("Stopped", Stop.Sentence, [Stop.Sentence]);
            running?.Fail();
            changed(ChildMessageKind.CellFailed, running);
        }
        Ended = DateTimeOffset.Now;
        changed(ChildMessageKind.Finished, null);
    }

    private void RequireCSharpCells()
    {
        foreach (var run in _cells)
        {
            if (run.Cell.Language is { } language && language.ToLowerInvariant() is not ("csharp" or "c#" or "polyglot-notebook" or "dotnet-interactive"))
            {
                throw new BadUsageException($"{run.Name} of {Document.Path} is in {language}, and this program runs C# cells; rewrite it or make it a raw cell.");
            }
        }
    }

    private CellRun? Take(ChildMessage message)
    {
        var cell = message.Cell >= 0 && message.Cell < _cells.Count ? _cells[message.Cell] : _current;
        switch (message.Kind)
        {
            case ChildMessageKind.CellStarted:
                _current = cell;
                cell?.Start();
                break;
            case ChildMessageKind.CellFinished:
                cell?.Finish();
                break;
            case ChildMessageKind.Stream:
                cell?.AddText(message.Stream ?? "stdout", message.Text ?? "");
                break;
            case ChildMessageKind.Display or ChildMessageKind.Result:
                cell?.Show(message);
                break;
            case ChildMessageKind.Update:
                if (!_cells.Exists(run => run.Update(message)))
                {
                    cell?.Show(message);
                }
                break;
            case ChildMessageKind.Verdict when message.Verdict is { } verdict:
                _verdicts.Add(new RunVerdict(verdict, cell));
                break;
            case ChildMessageKind.CellFailed when cell is not null && message.Failure is { } failure:
                Stop = RunStop.ByFailure(cell, failure, Limits);
                cell.AddError(failure.Name, failure.Message, failure.Trace.Count == 0 ? [Stop.Sentence] : [Stop.Sentence, .. failure.Trace]);
                cell.Fail();
                break;
        }
        return cell;
    }

    private static string FirstLine(string source) =>
        source.Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries)
            .FirstOrDefault(line => !line.StartsWith("//", StringComparison.Ordinal) && !line.StartsWith('#')) ?? "";
}
