using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The costs of every disparity at every pixel of a band of rows, while aggregation and optimisation work on them in place.</summary>
/// <remarks>
/// Every cost is finite: where a pixel has nothing to be compared with at a disparity stands <see cref="Unrelated"/>, so that it neither attracts
/// nor repels its surroundings; whether it can win is asked again afterwards.
/// </remarks>
public sealed class CostVolume
{
    private readonly float[][] rows;

    internal CostVolume(RectifiedPair pair, DisparityRange range, double unrelated, int firstRow, float[][] rows, int threads) =>
        (Pair, Range, Unrelated, FirstRow, this.rows, Threads) = (pair, range, unrelated, firstRow, rows, threads);

    /// <summary>The pair that is matched.</summary>
    public RectifiedPair Pair { get; }

    /// <summary>The disparities that are searched.</summary>
    public DisparityRange Range { get; }

    /// <summary>The size of the pictures.</summary>
    public PictureSize Size => Pair.Size;

    /// <summary>The cost that two unrelated pixels typically have.</summary>
    public double Unrelated { get; }

    /// <summary>The first row that the volume holds.</summary>
    public int FirstRow { get; }

    /// <summary>How many rows it holds.</summary>
    public int RowCount => rows.Length;

    /// <summary>The row behind the last one that it holds.</summary>
    public int EndRow => FirstRow + RowCount;

    internal int Threads { get; }

    internal float[][] Rows => rows;

    /// <summary>The costs of one row: that of column u and disparity d stands at <c>u · Range.Count + d − Range.Least</c>.</summary>
    /// <param name="v">The row, from <see cref="FirstRow"/> to <see cref="EndRow"/> − 1.</param>
    public Span<float> Row(int v) => rows[v - FirstRow];

    /// <summary>The costs of one pixel, from the least disparity to the greatest.</summary>
    public Span<float> At(int u, int v) => rows[v - FirstRow].AsSpan(u * Range.Count, Range.Count);

    /// <summary>Does something for every row, on several threads.</summary>
    /// <param name="stop">Asks to stop.</param>
    /// <param name="body">Told the row.</param>
    public void ForEachRow(CancellationToken stop, Action<int> body)
    {
        ArgumentNullException.ThrowIfNull(body);
        RowWork.ForEach(FirstRow, EndRow, Threads, stop, body);
    }
}
