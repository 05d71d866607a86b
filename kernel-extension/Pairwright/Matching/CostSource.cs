using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Aggregated costs, band of rows by band of rows, so that no more of the cost volume is held than is being looked at.</summary>
internal sealed class CostSource
{
    private readonly RectifiedPair pair;
    private readonly Recipe recipe;
    private readonly int threads;
    private readonly ICostRows rows;
    private readonly IAggregator aggregator;
    private readonly Stack<float[]> spare = new();
    private CostVolume? whole;

    public CostSource(RectifiedPair pair, Recipe recipe, int threads, CancellationToken stop)
    {
        (this.pair, this.recipe, this.threads) = (pair, recipe, threads);
        rows = StageGuard.Run(recipe.Cost, stop, () => recipe.Cost.Prepare(pair));
        Unrelated = StageGuard.Run(recipe.Cost, stop, () => CostScale.Of(recipe.Cost, rows, pair, recipe.Range));
        aggregator = StageGuard.Run(recipe.Aggregation, stop, () => recipe.Aggregation.Prepare(pair));
    }

    /// <summary>What two unrelated pixels typically cost.</summary>
    public double Unrelated { get; }

    /// <summary>How many rows around a band are needed to aggregate it; nothing where all are.</summary>
    public int? ReachPx => recipe.Aggregation.ReachPx;

    /// <summary>The bytes of the costs of one row.</summary>
    public long RowBytes => (long)sizeof(float) * pair.Size.Width * recipe.Range.Count;

    /// <summary>A band of aggregated costs, to be given back by <see cref="Return"/>.</summary>
    public CostVolume Band(int first, int end, CancellationToken stop)
    {
        if (whole is null && ReachPx is not { })
        {
            whole = Made(0, pair.Size.Height, stop);
        }

        if (whole is not null)
        {
            return new(pair, recipe.Range, Unrelated, first, whole.Rows[first..end], threads);
        }

        var reach = ReachPx!.Value;
        var made = Made(Math.Max(first - reach, 0), Math.Min(end + reach, pair.Size.Height), stop);
        for (var v = made.FirstRow; v < made.EndRow; v++)
        {
            if (v < first || v >= end)
            {
                spare.Push(made.Rows[v - made.FirstRow]);
            }
        }

        return new(pair, recipe.Range, Unrelated, first, made.Rows[(first - made.FirstRow)..(end - made.FirstRow)], threads);
    }

    /// <summary>Takes a band's memory back for the next one.</summary>
    public void Return(CostVolume band)
    {
        foreach (var row in whole is null ? band.Rows : [])
        {
            spare.Push(row);
        }
    }

    private CostVolume Made(int first, int end, CancellationToken stop)
    {
        var band = new float[end - first][];
        for (var i = 0; i < band.Length; i++)
        {
            band[i] = spare.TryPop(out var row) ? row : GC.AllocateUninitializedArray<float>(pair.Size.Width * recipe.Range.Count);
        }

        var costs = new CostVolume(pair, recipe.Range, Unrelated, first, band, threads);
        costs.ForEachRow(stop, v => Fill(v, band[v - first], stop));
        StageGuard.Run(recipe.Aggregation, stop, () => aggregator.Apply(costs, stop));
        return costs;
    }

    private void Fill(int v, float[] row, CancellationToken stop)
    {
        StageGuard.Run(recipe.Cost, stop, () => rows.Row(v, recipe.Range, row));
        var unrelated = (float)Unrelated;
        for (var i = 0; i < row.Length; i++)
        {
            if (!(row[i] >= 0))
            {
                throw new UserErrorException(
                    $"The cost '{recipe.Cost.Name}' gave {(float.IsNaN(row[i]) ? "NaN" : $"{row[i]}")} at column {i / recipe.Range.Count} of row {v} for disparity {recipe.Range.Least + i % recipe.Range.Count}; a cost is a number not below zero, or positive infinity where nothing can be compared.");
            }

            row[i] = float.IsPositiveInfinity(row[i]) ? unrelated : row[i];
        }
    }
}
