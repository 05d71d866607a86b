namespace Pairwright.Matching;

/// <summary>The path costs of one direction at one row.</summary>
/// <remarks>A pixel's costs stand between two infinite ones, so that a change of disparity by one needs no look at the ends.</remarks>
internal sealed class PathRow
{
    private readonly int stride;
    private readonly float[] values;

    public PathRow(int width, int count)
    {
        stride = count + 2;
        values = new float[width * stride];
        for (var u = 0; u < width; u++)
        {
            (values[u * stride], values[(u + 1) * stride - 1]) = (float.PositiveInfinity, float.PositiveInfinity);
        }

        Least = new float[width];
    }

    /// <summary>The least path cost of each pixel.</summary>
    public float[] Least { get; }

    /// <summary>The bytes of a row.</summary>
    public static long Bytes(int width, int count) => sizeof(float) * (long)width * (count + 3);

    /// <summary>The path costs of a pixel, with the infinite ones at either end.</summary>
    public Span<float> At(int u) => values.AsSpan(u * stride, stride);

    /// <summary>Takes over another row's costs.</summary>
    public void CopyFrom(PathRow other)
    {
        other.values.CopyTo(values, 0);
        other.Least.CopyTo(Least, 0);
    }
}
