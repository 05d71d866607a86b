using System.Runtime.ExceptionServices;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Semi-global matching on an explicit cost volume, written as the equations stand. It runs any cost, and is what faster paths are compared with.</summary>
internal sealed class PlainMatcher
{
    private static readonly (int U, int V)[] Directions = [(1, 0), (-1, 0), (0, 1), (0, -1), (1, 1), (-1, -1), (-1, 1), (1, -1)];

    private readonly RectifiedPair pair;
    private readonly Recipe recipe;
    private readonly MatcherSettings settings;
    private readonly int width;
    private readonly int height;
    private readonly int count;
    private readonly ICostRows rows;
    private readonly float unrelated;
    private readonly float small;
    private readonly float large;

    public PlainMatcher(RectifiedPair pair, Recipe recipe, MatcherSettings settings)
    {
        (this.pair, this.recipe, this.settings) = (pair, recipe, settings);
        (width, height, count) = (pair.Size.Width, pair.Size.Height, recipe.Range.Count);
        rows = StageGuard.Run(recipe.Cost, default, () => recipe.Cost.Prepare(pair));
        unrelated = (float)StageGuard.Run(recipe.Cost, default, () => CostScale.Of(recipe.Cost, rows, pair, recipe.Range));
        var optimisation = (SemiGlobal)recipe.Optimisation;
        (small, large) = ((float)optimisation.SmallPenalty(unrelated), (float)optimisation.LargePenalty(unrelated));
    }

    public void Run(WorkingMap map, CancellationToken stop, IProgress<double>? progress)
    {
        var steps = Directions.Length + 2;
        var costs = Costs(stop);
        progress?.Report(1.0 / steps);
        var totals = Enumerable.Range(0, height).Select(_ => new float[width * count]).ToArray();
        for (var i = 0; i < Directions.Length; i++)
        {
            Add(Directions[i], costs, totals, stop);
            progress?.Report((i + 2.0) / steps);
        }

        ForRows(stop, () => (Row: new RowMatches(pair, recipe.Range), RightLowest: new float[width]), (v, state) =>
        {
            Decide(v, totals[v], state.Row, state.RightLowest);
            RowFinish.Apply(state.Row, recipe, map, stop);
        });
    }

    private float[][] Costs(CancellationToken stop)
    {
        var costs = new float[height][];
        ForRows(stop, () => 0, (v, _) =>
        {
            var row = new float[width * count];
            StageGuard.Run(recipe.Cost, stop, () => rows.Row(v, recipe.Range, row));

            // What cannot be compared neither attracts nor repels a path.
            for (var i = 0; i < row.Length; i++)
            {
                if (!(row[i] >= 0))
                {
                    throw new UserErrorException(
                        $"The cost '{recipe.Cost.Name}' gave {(float.IsNaN(row[i]) ? "NaN" : $"{row[i]}")} at column {i / count} of row {v} for disparity {recipe.Range.Least + i % count}; a cost is a number not below zero, or positive infinity where nothing can be compared.");
                }

                row[i] = float.IsPositiveInfinity(row[i]) ? unrelated : row[i];
            }

            costs[v] = row;
        });
        return costs;
    }

    // Adds the path costs of one direction to the totals.
    private void Add((int U, int V) direction, float[][] costs, float[][] totals, CancellationToken stop)
    {
        if (direction.V == 0)
        {
            ForRows(stop, () => new float[width * count], (v, path) =>
            {
                for (var i = 0; i < width; i++)
                {
                    var u = direction.U > 0 ? i : width - 1 - i;
                    Step(costs[v], u, u - direction.U, path, path, totals[v]);
                }
            });
            return;
        }

        var (previous, current) = (new float[width * count], new float[width * count]);
        for (var i = 0; i < height; i++)
        {
            stop.ThrowIfCancellationRequested();
            var v = direction.V > 0 ? i : height - 1 - i;
            var (from, to) = (previous, current);
            var first = i == 0;
            Parallel.For(0, width, new() { MaxDegreeOfParallelism = settings.Threads }, u => Step(costs[v], u, first ? -1 : u - direction.U, from, to, totals[v]));
            (previous, current) = (current, previous);
        }
    }

    // One pixel of one path (Hirschmüller 2008, equation 13); a column before that lies outside starts a path.
    private void Step(float[] costs, int u, int before, float[] from, float[] to, float[] totals)
    {
        var cost = costs.AsSpan(u * count, count);
        var path = to.AsSpan(u * count, count);
        var total = totals.AsSpan(u * count, count);
        if (before < 0 || before >= width)
        {
            for (var d = 0; d < count; d++)
            {
                path[d] = cost[d];
                total[d] += cost[d];
            }

            return;
        }

        var last = from.AsSpan(before * count, count);
        var least = float.PositiveInfinity;
        foreach (var value in last)
        {
            least = Math.Min(least, value);
        }

        for (var d = 0; d < count; d++)
        {
            var best = Math.Min(last[d], least + large);
            best = d > 0 ? Math.Min(best, last[d - 1] + small) : best;
            best = d < count - 1 ? Math.Min(best, last[d + 1] + small) : best;
            path[d] = cost[d] + best - least;
            total[d] += path[d];
        }
    }

    private void Decide(int v, float[] totals, RowMatches row, float[] rightLowest)
    {
        row.V = v;
        row.RightWinner.Fill(RowMatches.None);
        rightLowest.AsSpan().Fill(float.PositiveInfinity);
        for (var u = 0; u < width; u++)
        {
            var total = totals.AsSpan(u * count, count);
            var winner = -1;
            for (var i = 0; i < count; i++)
            {
                if (!pair.CanCompare(u, v, recipe.Range.Least + i))
                {
                    total[i] = float.PositiveInfinity;
                    continue;
                }

                winner = winner < 0 || total[i] < total[winner] ? i : winner;
                var right = u - recipe.Range.Least - i;
                if (total[i] < rightLowest[right] || (total[i] == rightLowest[right] && recipe.Range.Least + i < row.RightWinner[right]))
                {
                    (rightLowest[right], row.RightWinner[right]) = (total[i], recipe.Range.Least + i);
                }
            }

            if (winner < 0)
            {
                (row.Winner[u], row.Lowest[u], row.Before[u], row.After[u], row.SecondLowest[u]) = (RowMatches.None, float.NaN, float.NaN, float.NaN, float.NaN);
                continue;
            }

            var second = float.PositiveInfinity;
            for (var i = 0; i < count; i++)
            {
                second = Math.Abs(i - winner) > 1 ? Math.Min(second, total[i]) : second;
            }

            row.Winner[u] = recipe.Range.Least + winner;
            row.Lowest[u] = total[winner];
            row.Before[u] = winner > 0 && float.IsFinite(total[winner - 1]) ? total[winner - 1] : float.NaN;
            row.After[u] = winner < count - 1 && float.IsFinite(total[winner + 1]) ? total[winner + 1] : float.NaN;
            row.SecondLowest[u] = second;
        }
    }

    private void ForRows<TState>(CancellationToken stop, Func<TState> start, Action<int, TState> body)
    {
        try
        {
            Parallel.For(
                0,
                height,
                new() { MaxDegreeOfParallelism = settings.Threads, CancellationToken = stop },
                start,
                (v, _, state) =>
                {
                    body(v, state);
                    return state;
                },
                _ => { });
        }
        catch (AggregateException fault) when (fault.InnerExceptions.FirstOrDefault() is UserErrorException first)
        {
            ExceptionDispatchInfo.Capture(first).Throw();
        }
    }
}
