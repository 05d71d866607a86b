using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Carries out any recipe on explicit costs, a band of rows at a time. It is what faster paths are compared with.</summary>
internal sealed class PlainMatcher(RectifiedPair pair, Recipe recipe, MatcherSettings settings)
{
    // Rows that a winner-take-all looks at together, so that what surrounds a band is not aggregated too often.
    private const int BandRows = 32;

    public void Run(WorkingMap map, CancellationToken stop, IProgress<double>? progress)
    {
        var source = new CostSource(pair, recipe, settings.Threads, stop);
        using var decisions = new ThreadLocal<TotalsDecision>(() => new(pair, recipe.Range));
        void Done(int v, float[] totals)
        {
            var decision = decisions.Value!;
            decision.Decide(v, totals);
            RowFinish.Apply(decision.Row, recipe, map, stop);
        }

        void Progress(double share) => progress?.Report(share);
        switch (recipe.Optimisation)
        {
            case SemiGlobal semiGlobal:
                var run = new SemiGlobalRun(pair, recipe.Range, semiGlobal, source, settings);
                Require(run.NeededBytes);
                run.Run(source, Done, stop, Progress);
                break;
            case WinnerTakesAll:
                RunInBands(source, Done, stop, Progress);
                break;
            default:
                RunWhole(source, Done, stop);
                break;
        }
    }

    private void RunInBands(CostSource source, Action<int, float[]> done, CancellationToken stop, Action<double> progress)
    {
        var height = pair.Size.Height;
        var rows = settings.StripRows ?? Math.Max(BandRows, 3 * (source.ReachPx ?? 0));
        Require((source.ReachPx is { } reach ? Math.Min(rows + 2 * reach, height) : height) * source.RowBytes);
        for (var first = 0; first < height; first += rows)
        {
            var costs = source.Band(first, Math.Min(first + rows, height), stop);
            RowWork.ForEach(costs.FirstRow, costs.EndRow, settings.Threads, stop, v => done(v, costs.Rows[v - costs.FirstRow]));
            source.Return(costs);
            progress(costs.EndRow / (double)height);
        }
    }

    private void RunWhole(CostSource source, Action<int, float[]> done, CancellationToken stop)
    {
        Require(pair.Size.Height * source.RowBytes);
        var costs = source.Band(0, pair.Size.Height, stop);
        StageGuard.Run(recipe.Optimisation, stop, () => recipe.Optimisation.Apply(costs, stop));
        RowWork.ForEach(0, pair.Size.Height, settings.Threads, stop, v =>
        {
            foreach (var total in costs.Row(v))
            {
                if (!float.IsFinite(total))
                {
                    throw new UserErrorException($"The optimisation '{recipe.Optimisation.Name}' left a total of {total} in row {v}; every total is a finite number.");
                }
            }

            done(v, costs.Rows[v]);
        });
    }

    private void Require(long bytes)
    {
        var allowed = settings.MemoryBytes ?? GC.GetGCMemoryInfo().TotalAvailableMemoryBytes;
        if (bytes > allowed)
        {
            throw new UserErrorException(
                $"A match of pictures of {pair.Size} px over {recipe.Range.Count} disparities with this recipe needs {(bytes + 999_999) / 1_000_000} MB for its costs, but only {allowed / 1_000_000} MB are there; allow more, narrow the range, or crop or shrink the pictures.");
        }
    }
}
