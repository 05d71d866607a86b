using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Follows the paths of one direction over rows, one row after the other.</summary>
/// <remarks>It carries the path costs of as many earlier rows as the direction reaches back.</remarks>
internal sealed class PathSweep
{
    private readonly PathDirection direction;
    private readonly PathPenalties penalties;
    private readonly int width;
    private readonly int count;
    private readonly PathRow[] rows;
    private int seen;

    public PathSweep(PathDirection direction, PathPenalties penalties, int width, int count)
    {
        (this.direction, this.penalties, this.width, this.count) = (direction, penalties, width, count);
        rows = [.. Enumerable.Range(0, direction.Depth + 1).Select(_ => new PathRow(width, count))];
    }

    private PathSweep(PathSweep other)
        : this(other.direction, other.penalties, other.width, other.count) => CopyFrom(other);

    /// <summary>Whether a pixel depends on another of its own row, so that a row cannot be split.</summary>
    public bool NeedsOwnRow => direction.NeedsOwnRow;

    /// <summary>The same state in memory of its own.</summary>
    public PathSweep Copy() => new(this);

    /// <summary>Takes over another sweep's state.</summary>
    public void CopyFrom(PathSweep other)
    {
        seen = other.seen;
        for (var i = 0; i < rows.Length; i++)
        {
            rows[i].CopyFrom(other.rows[i]);
        }
    }

    /// <summary>Begins the next row.</summary>
    public void Next()
    {
        var last = rows[^1];
        Array.Copy(rows, 0, rows, 1, rows.Length - 1);
        rows[0] = last;
        seen++;
    }

    /// <summary>Follows the paths to the columns of the row that has begun.</summary>
    /// <param name="v">The row.</param>
    /// <param name="costs">Its costs.</param>
    /// <param name="first">The first column.</param>
    /// <param name="end">The column behind the last.</param>
    /// <param name="totals">Where the path costs are added; empty where they are not wanted.</param>
    public void Follow(int v, ReadOnlySpan<float> costs, int first, int end, Span<float> totals)
    {
        for (var i = first; i < end; i++)
        {
            var u = IsRightToLeft ? end - 1 + first - i : i;
            var cost = costs.Slice(u * count, count);
            var path = rows[0].At(u);
            rows[0].Least[u] = Step(u, v, cost, path);
            if (!totals.IsEmpty)
            {
                PathStep.Add(path, totals.Slice(u * count, count));
            }
        }
    }

    private bool IsRightToLeft => direction.Second is { } second && (direction.V == 0 ? direction.U : second.U) < 0;

    private float Step(int u, int v, ReadOnlySpan<float> cost, Span<float> path)
    {
        var first = Before(u, direction.U, direction.V);
        var second = direction.Second is { } other ? Before(u, other.U, other.V) : null;
        if (first is { } a && second is { } b)
        {
            return PathStep.FromTwo(
                cost,
                a.Row.At(a.U),
                a.Row.Least[a.U],
                penalties.Large(u, v, direction.U, direction.V),
                b.Row.At(b.U),
                b.Row.Least[b.U],
                penalties.Large(u, v, direction.Second!.Value.U, direction.Second.Value.V),
                penalties.Small,
                path);
        }

        var (only, du, dv) = first is not null ? (first, direction.U, direction.V) : (second, direction.Second?.U ?? 0, direction.Second?.V ?? 0);
        return only is { } q
            ? PathStep.From(cost, q.Row.At(q.U), q.Row.Least[q.U], penalties.Small, penalties.Large(u, v, du, dv), path)
            : PathStep.Begin(cost, path);
    }

    // The pixel that a step away leads from; nothing outside the picture.
    private (PathRow Row, int U)? Before(int u, int du, int dv)
    {
        var (back, column) = (Math.Abs(dv), u - du);
        return column >= 0 && column < width && back < seen ? (rows[back], column) : null;
    }
}
