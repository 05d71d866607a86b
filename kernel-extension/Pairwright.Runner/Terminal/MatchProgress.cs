using System.Diagnostics;
using System.Globalization;
using Pairwright.Matching;
using Pairwright.Runner.Matching;
using Pairwright.Trials;
using Spectre.Console;

namespace Pairwright.Runner.Terminal;

/// <summary>Shows a run of <c>match</c> in the terminal: a line for each pair, then how it came out.</summary>
internal sealed class MatchProgress
{
    private static readonly TimeSpan BetweenSteps = TimeSpan.FromMilliseconds(100);

    private readonly IReadOnlyList<PairFiles> _pairs;
    private readonly LiveLine _line;
    private readonly Lock _gate = new();
    private readonly Stopwatch _clock = Stopwatch.StartNew();
    private readonly int _nameWidth;
    private int _done;
    private int _there;
    private int _failed;

    public MatchProgress(IAnsiConsole console, IReadOnlyList<PairFiles> pairs, IReadOnlyList<string> alone, MatchJob job)
    {
        _pairs = pairs;
        _line = new LiveLine(console);
        _nameWidth = Math.Min(pairs.Max(pair => pair.Name.Length), 40);
        _failed = alone.Count;
        _line.Stand($"{(pairs.Count == 1 ? "1 pair" : $"{pairs.Count} pairs")}, recipe {job.Recipe.Id}, searching {job.Recipe.Range.Least} to {job.Recipe.Range.Most} px");
        foreach (var file in alone)
        {
            _line.Stand($"  {file} has no partner and is left out; add the other view or take it away.");
        }
    }

    /// <summary>Hears the share of one pair that is done.</summary>
    public IProgress<double> Of(PairFiles files)
    {
        _line.Show($"{Place(files)}  …");
        return new Share(this, files);
    }

    public void Done(PairFiles files, PairResult result)
    {
        var (map, accuracy, withFilled) = result;
        lock (_gate)
        {
            _done++;
            _line.Stand($"{Place(files)}  {Figures(map, accuracy)}", good: true);
            foreach (var warning in map.Pair.Warnings)
            {
                _line.Stand($"    {warning}");
            }
            if (_pairs.Count == 1 && accuracy is not null)
            {
                Show(accuracy);
            }
            if (_pairs.Count == 1 && withFilled is not null)
            {
                _line.Stand("  measured and filled values together:");
                Show(withFilled);
            }
        }
    }

    public void WasThere(PairFiles files)
    {
        lock (_gate)
        {
            _there++;
            _line.Stand($"{Place(files)}  was there already, made from the same files in the same way", good: true);
        }
    }

    public void Failed(PairFiles files, string sentence)
    {
        lock (_gate)
        {
            _failed++;
            _line.Stand($"{Place(files)}  {sentence}", good: false);
        }
    }

    public void Stopped()
    {
        lock (_gate)
        {
            _line.Stand($"Stopped after {_done + _there} of {_pairs.Count}; run the same command again to go on from there.");
        }
    }

    /// <returns>Whether all pairs are done.</returns>
    public bool End()
    {
        if (_pairs.Count > 1 || _failed > 0)
        {
            var there = _there > 0 ? $", {_there} of them by an earlier run" : "";
            var failed = _failed > 0 ? $"; {_failed} could not be: see above" : "";
            _line.Stand($"{_done + _there} of {_pairs.Count} pairs are matched{there}{failed}.");
        }
        return _failed == 0;
    }

    private static string Figures(DisparityMap map, DisparityAccuracy? accuracy)
    {
        var truth = accuracy is null ? "" : Text($", beyond {BoundOf(accuracy):0.##} px of the truth {accuracy[TruthRegion.All].ShareBeyond(BoundOf(accuracy)):0.00%}");
        return Text($"{map.MatchedShare:0.0%} measured, {map.RangeEndShare:0.0%} at an end of the range{truth}{map.Elapsed.TotalSeconds,8:0.0} s");
    }

    private static double BoundOf(DisparityAccuracy accuracy) => Math.Max(1, accuracy.Truth.ResolutionPx);

    private void Show(DisparityAccuracy accuracy)
    {
        foreach (var region in accuracy.Regions.Where(region => region.Pixels > 0))
        {
            _line.Stand($"    {region}");
        }
        _line.Stand($"    {accuracy.DensityCurve(BoundOf(accuracy))}");
    }

    private string Place(PairFiles files)
    {
        var name = files.Name.Length <= _nameWidth ? files.Name : files.Name[..(_nameWidth - 1)] + "…";
        var place = $"{_pairs.ToList().IndexOf(files) + 1}/{_pairs.Count}";
        return _pairs.Count == 1 ? $"  {name}" : $"{place,9}  {name.PadRight(_nameWidth)}";
    }

    private static string Text(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);

    private sealed class Share(MatchProgress progress, PairFiles files) : IProgress<double>
    {
        private TimeSpan _last;

        public void Report(double value)
        {
            lock (progress._gate)
            {
                if (progress._clock.Elapsed - _last > BetweenSteps)
                {
                    _last = progress._clock.Elapsed;
                    progress._line.Show(Text($"{progress.Place(files)}  {value,4:0%}"));
                }
            }
        }
    }
}
