using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Semi-global matching on bands of costs: totals come out row by row, from the last to the first.</summary>
/// <remarks>
/// Paths from above need the whole picture above a row, those from below all below it. The first pass follows the paths from above and keeps
/// their state where each band begins; the second goes through the bands from the last to the first, follows the paths from above through the
/// band once more, and those from below on from the band before. So the costs are looked at twice, and of totals no more than a band is held.
/// </remarks>
internal sealed class SemiGlobalRun
{
    private readonly int width;
    private readonly int height;
    private readonly int count;
    private readonly int threads;
    private readonly PathPenalties penalties;
    private readonly PathDirection[] withinRow;
    private readonly PathSweep[] down;
    private readonly PathSweep[] up;
    private readonly int bandRows;

    public SemiGlobalRun(RectifiedPair pair, DisparityRange range, SemiGlobal how, CostSource source, MatcherSettings settings)
    {
        (width, height, count, threads) = (pair.Size.Width, pair.Size.Height, range.Count, settings.Threads);
        penalties = new(how, source.Unrelated, pair.Left);
        var directions = PathDirection.Of(how.Paths, how.TwoParents);
        withinRow = [.. directions.Where(direction => direction.IsWithinRow)];
        down = [.. directions.Where(direction => direction.IsDown).Select(direction => new PathSweep(direction, penalties, width, count))];
        up = [.. directions.Where(direction => direction.IsUp).Select(direction => new PathSweep(direction, penalties, width, count))];

        // States kept at every band's beginning against costs and totals of one band: the sum is least at the root.
        var stateRows = directions.Where(direction => direction.IsDown).Sum(direction => direction.Depth + 1);
        bandRows = settings.StripRows ?? Math.Max((int)Math.Sqrt(height * stateRows / 2.0), 3 * (source.ReachPx ?? 0) + 1);
        bandRows = Math.Clamp(bandRows, 1, height);
        var bands = (height + bandRows - 1) / bandRows;
        var pathRowBytes = PathRow.Bytes(width, count);
        NeededBytes = (bands + 1) * stateRows * pathRowBytes
            + (source.ReachPx is { } reach ? Math.Min(bandRows + 2 * reach, height) : height) * source.RowBytes
            + bandRows * source.RowBytes
            + (how.TwoParents ? (down.Length + up.Length) * bandRows * source.RowBytes : 0);
    }

    /// <summary>The bytes that the run takes beside the pictures and the map.</summary>
    public long NeededBytes { get; }

    /// <summary>Runs.</summary>
    /// <param name="source">The costs.</param>
    /// <param name="done">Given each row and its totals, from several threads at once; the array is used again afterwards.</param>
    /// <param name="stop">Asks to stop.</param>
    /// <param name="progress">Told the share done, 0 to 1.</param>
    public void Run(CostSource source, Action<int, float[]> done, CancellationToken stop, Action<double>? progress)
    {
        var bands = (height + bandRows - 1) / bandRows;
        var kept = new PathSweep[bands][];
        for (var band = 0; band < bands - 1; band++)
        {
            kept[band] = [.. down.Select(sweep => sweep.Copy())];
            var costs = Band(source, band, stop);
            Follow(down, costs, null, stop);
            source.Return(costs);
            progress?.Invoke((band + 1.0) / (2 * bands));
        }

        var totals = Enumerable.Range(0, bandRows).Select(_ => new float[width * count]).ToArray();
        for (var band = bands - 1; band >= 0; band--)
        {
            for (var i = 0; band < bands - 1 && i < down.Length; i++)
            {
                down[i].CopyFrom(kept[band][i]);
            }

            kept[band] = [];
            var costs = Band(source, band, stop);
            RowWork.ForEach(costs.FirstRow, costs.EndRow, threads, stop, () => (new PathRow(2, count)), (v, path) =>
            {
                var total = totals[v - costs.FirstRow];
                total.AsSpan().Clear();
                foreach (var direction in withinRow)
                {
                    FollowRow(direction, v, costs.Row(v), path, total);
                }
            });
            Follow(down, costs, totals, stop);
            Follow(up, costs, totals, stop);
            RowWork.ForEach(costs.FirstRow, costs.EndRow, threads, stop, v => done(v, totals[v - costs.FirstRow]));
            source.Return(costs);
            progress?.Invoke(0.5 + (bands - band) / (2.0 * bands));
        }
    }

    private CostVolume Band(CostSource source, int band, CancellationToken stop) =>
        source.Band(band * bandRows, Math.Min((band + 1) * bandRows, height), stop);

    private void FollowRow(PathDirection direction, int v, ReadOnlySpan<float> costs, PathRow path, Span<float> totals)
    {
        for (var i = 0; i < width; i++)
        {
            var u = direction.U > 0 ? i : width - 1 - i;
            var cost = costs.Slice(u * count, count);
            var (here, before) = (i % 2, (i + 1) % 2);
            path.Least[here] = i == 0
                ? PathStep.Begin(cost, path.At(here))
                : PathStep.From(cost, path.At(before), path.Least[before], penalties.Small, penalties.Large(u, v, direction.U, 0), path.At(here));
            PathStep.Add(path.At(here), totals.Slice(u * count, count));
        }
    }

    // Follows sweeps through a band, those from below from its last row to its first.
    private void Follow(PathSweep[] sweeps, CostVolume costs, float[][]? totals, CancellationToken stop)
    {
        var fromBelow = ReferenceEquals(sweeps, up);
        if (sweeps.Any(sweep => sweep.NeedsOwnRow))
        {
            FollowEachAlone(sweeps, costs, totals, fromBelow, stop);
            return;
        }

        // Pixels of one row know nothing of each other: each thread takes a stretch of it.
        var parts = Math.Clamp(threads, 1, Math.Max(width / 16, 1));
        for (var i = 0; i < costs.RowCount; i++)
        {
            stop.ThrowIfCancellationRequested();
            var v = fromBelow ? costs.EndRow - 1 - i : costs.FirstRow + i;
            foreach (var sweep in sweeps)
            {
                sweep.Next();
            }

            RowWork.ForEach(0, parts, parts, stop, part =>
            {
                foreach (var sweep in sweeps)
                {
                    sweep.Follow(v, costs.Row(v), part * width / parts, (part + 1) * width / parts, totals is null ? default : totals[v - costs.FirstRow]);
                }
            });
        }
    }

    // A row cannot be split, but directions know nothing of each other: each is followed alone into totals of its own, which are added in order.
    private void FollowEachAlone(PathSweep[] sweeps, CostVolume costs, float[][]? totals, bool fromBelow, CancellationToken stop)
    {
        var own = sweeps.Select(_ => totals is null ? null : Enumerable.Range(0, costs.RowCount).Select(_ => new float[width * count]).ToArray()).ToArray();
        RowWork.ForEach(0, sweeps.Length, threads, stop, s =>
        {
            for (var i = 0; i < costs.RowCount; i++)
            {
                stop.ThrowIfCancellationRequested();
                var v = fromBelow ? costs.EndRow - 1 - i : costs.FirstRow + i;
                sweeps[s].Next();
                sweeps[s].Follow(v, costs.Row(v), 0, width, own[s] is { } rows ? rows[v - costs.FirstRow] : default);
            }
        });
        if (totals is not null)
        {
            RowWork.ForEach(0, costs.RowCount, threads, stop, row =>
            {
                foreach (var rows in own)
                {
                    var part = rows![row];
                    for (var i = 0; i < part.Length; i++)
                    {
                        totals[row][i] += part[i];
                    }
                }
            });
        }
    }
}
