using System.Diagnostics;
using Pairwright.Runner.Documents;
using Pairwright.Runner.Execution;
using Pairwright.Runner.Reports;
using Pairwright.Runner.Terminal;
using Spectre.Console;
using Spectre.Console.Cli;

namespace Pairwright.Runner.Commands;

/// <summary>Runs a notebook headless and leaves its reports.</summary>
internal sealed class RunCommand(IAnsiConsole console) : AsyncCommand<RunSettings>
{
    private static readonly TimeSpan BetweenWrites = TimeSpan.FromSeconds(2);

    public override async Task<int> ExecuteAsync(CommandContext context, RunSettings settings, CancellationToken cancellationToken)
    {
        var limits = LimitsOf(settings);
        var document = NotebookDocument.Read(settings.Notebook);
        var parameters = ParameterSet.Split(settings.Set);
        Inject(document, settings.Notebook, parameters);

        var run = new NotebookRun(document, parameters, limits);
        var files = new ReportFiles(run, settings.Out);
        var progress = new RunProgress(console, run);

        using var interruption = new Interruption();

        // Written before the first cell too: whatever happens, no report of an earlier run is left to be taken for this one's.
        files.Write();
        progress.Begin();
        var sinceWrite = Stopwatch.StartNew();
        try
        {
            await run.RunAsync(Changed, TimeProvider.System, interruption.Token);
        }
        catch (UserErrorException lost)
        {
            progress.Lost(lost.Message);
            return ExitCode.Stopped;
        }
        progress.End(files);
        return run.ExitCode;

        void Changed(ChildMessageKind kind, CellRun? cell)
        {
            var step = kind is ChildMessageKind.CellStarted or ChildMessageKind.CellFinished or ChildMessageKind.CellFailed or ChildMessageKind.Finished;
            if (step || sinceWrite.Elapsed > BetweenWrites)
            {
                files.Write();
                sinceWrite.Restart();
            }
            switch (kind, cell)
            {
                case (ChildMessageKind.CellStarted, { } started):
                    progress.Started(started);
                    break;
                case (ChildMessageKind.CellFinished or ChildMessageKind.CellFailed, { } ended):
                    progress.Ended(ended);
                    break;
            }
        }
    }

    private static RunLimits LimitsOf(RunSettings settings)
    {
        if (!double.IsFinite(settings.TimeLimit) || settings.TimeLimit is <= 0 or > 1e7)
        {
            throw new BadUsageException($"--time-limit {settings.TimeLimit}: give a number of seconds greater than 0.");
        }
        if (settings.MemoryLimit is < RunLimits.LeastMemoryMb)
        {
            throw new BadUsageException($"--memory-limit {settings.MemoryLimit}: the kernel alone needs {RunLimits.LeastMemoryMb} MB; give at least that.");
        }
        return new RunLimits(TimeSpan.FromSeconds(settings.TimeLimit), settings.MemoryLimit ?? RunLimits.DefaultMemoryMb);
    }

    private static void Inject(NotebookDocument document, string name, IReadOnlyList<KeyValuePair<string, string>> parameters)
    {
        if (parameters.Count == 0)
        {
            document.RemoveInjected();
            return;
        }
        var cell = document.ParametersCell
            ?? throw new BadUsageException($"--set needs a cell tagged '{NotebookCell.ParametersTag}', and {name} has none; tag the cell that declares the variables.");
        document.InjectAfter(cell, NotebookCell.Code(ParameterSet.DeclaredIn(cell.Source).Assign(parameters), NotebookCell.InjectedTag));
    }
}
