using Pairwright.Runner.Matching;
using Pairwright.Runner.Terminal;
using Spectre.Console;
using Spectre.Console.Cli;

namespace Pairwright.Runner.Commands;

/// <summary>Matches one pair, or all pairs that fit a pattern, and writes their maps.</summary>
internal sealed class MatchCommand(IAnsiConsole console) : AsyncCommand<MatchSettings>
{
    public override async Task<int> ExecuteAsync(CommandContext context, MatchSettings settings, CancellationToken cancellationToken)
    {
        var (pairs, alone) = PairFinder.Find(settings);
        var job = MatchJob.Of(settings);
        using var interruption = new Interruption();
        return await Task.Run(() => Match(pairs, alone, job, interruption.Token), CancellationToken.None);
    }

    private int Match(IReadOnlyList<PairFiles> pairs, IReadOnlyList<string> alone, MatchJob job, CancellationToken stop)
    {
        var single = pairs.Count == 1 && alone.Count == 0;
        var progress = new MatchProgress(console, pairs, alone, job);
        foreach (var files in pairs)
        {
            try
            {
                stop.ThrowIfCancellationRequested();
                var madeFrom = PairRecord.MadeFrom(files, job);
                if (PairRecord.IsDone(files, madeFrom))
                {
                    progress.WasThere(files);
                    continue;
                }

                var result = PairMatcher.Match(files, job, stop, progress.Of(files));
                PairRecord.Write(files, madeFrom, result);
                progress.Done(files, result);
            }
            catch (OperationCanceledException)
            {
                progress.Stopped();
                return ExitCode.Interrupted;
            }
            catch (UserErrorException mistake) when (!single)
            {
                progress.Failed(files, mistake.Message);
            }
        }
        return progress.End() ? ExitCode.AllMet : ExitCode.Stopped;
    }
}
