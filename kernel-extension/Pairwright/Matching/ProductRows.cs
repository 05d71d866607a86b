using System.Numerics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The costs of rows for a method that needs no more of two windows than the sums of their levels, of the squares and of the products.</summary>
/// <remarks>
/// A level has at most 16 bits, so sums of products over any window of sensible size are exact in double precision, in whatever order they are
/// taken: sliding windows give what the definition says.
/// </remarks>
internal abstract class ProductRows(RectifiedPair pair, int halfWidth, int halfHeight) : ICostRows
{
    public void Row(int v, DisparityRange range, Span<float> costs)
    {
        var (width, count) = (pair.Size.Width, range.Count);
        var (padded, rows) = (width + 2 * halfWidth, 2 * halfHeight + 1);
        var left = new float[rows][];
        var right = new RightRow[rows];
        var levels = new float[padded];
        var (leftSums, rightSums) = (new WindowSums(padded, halfWidth), new WindowSums(padded, halfWidth));
        for (var j = 0; j < rows; j++)
        {
            left[j] = new float[padded];
            WindowRows.Fill(pair.Left, v + j - halfHeight, halfWidth, left[j]);
            WindowRows.Fill(pair.Right, v + j - halfHeight, halfWidth, levels);
            right[j] = new(width, range, halfWidth);
            right[j].Set(levels);
            leftSums.Add(left[j]);
            rightSums.Add(levels);
        }

        leftSums.Close();
        rightSums.Close();

        // Sums of products of single columns, the last 2·half + 1 of them, and their running sum.
        var columns = new double[(2 * halfWidth + 1) * count];
        var sums = new double[count];
        for (var x = -halfWidth; x < width + halfWidth; x++)
        {
            var column = columns.AsSpan((x + halfWidth) % (2 * halfWidth + 1) * count, count);
            Subtract(sums, column);
            column.Clear();
            for (var j = 0; j < rows; j++)
            {
                AddProducts(left[j][x + halfWidth], right[j].Under(x), column);
            }

            Add(sums, column);
            var u = x - halfWidth;
            if (u >= 0)
            {
                var pixel = costs.Slice(u * count, count);
                var first = Math.Clamp(u - width + 1 - range.Least, 0, count);
                var end = Math.Clamp(u - range.Least + 1, first, count);
                for (var i = first; i < end; i++)
                {
                    var r = u - range.Least - i;
                    pixel[i] = Cost(leftSums.Levels[u], leftSums.Squares[u], rightSums.Levels[r], rightSums.Squares[r], sums[i]);
                }
            }
        }

        ComparableCosts.Close(pair, v, range, costs);
    }

    /// <summary>The cost of two windows from their sums.</summary>
    protected abstract float Cost(double left, double leftSquares, double right, double rightSquares, double products);

    private static void AddProducts(float level, ReadOnlySpan<float> under, Span<double> column)
    {
        var factor = new Vector<double>(level);
        var i = 0;
        for (; i <= column.Length - Vector<float>.Count; i += Vector<float>.Count)
        {
            Vector.Widen(new Vector<float>(under[i..]), out var lower, out var upper);
            (new Vector<double>(column[i..]) + factor * lower).CopyTo(column[i..]);
            var next = column[(i + Vector<double>.Count)..];
            (new Vector<double>(next) + factor * upper).CopyTo(next);
        }

        for (; i < column.Length; i++)
        {
            column[i] += (double)level * under[i];
        }
    }

    private static void Add(Span<double> sums, ReadOnlySpan<double> column)
    {
        for (var i = 0; i < sums.Length; i++)
        {
            sums[i] += column[i];
        }
    }

    private static void Subtract(Span<double> sums, ReadOnlySpan<double> column)
    {
        for (var i = 0; i < sums.Length; i++)
        {
            sums[i] -= column[i];
        }
    }
}
