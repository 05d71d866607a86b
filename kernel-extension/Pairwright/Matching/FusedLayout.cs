using Pairwright.Geometry;

namespace Pairwright.Matching;

/// <summary>Where the fused matcher keeps what, for one size, range and vector width.</summary>
/// <remarks>
/// A pixel's disparities stand side by side, the least first. Behind the last one stand lanes without meaning up to a whole vector: their costs
/// are 255 and stay so.
/// </remarks>
internal sealed record FusedLayout
{
    /// <param name="size">The pictures' size.</param>
    /// <param name="range">The disparities.</param>
    /// <param name="laneBytes">How many bytes a vector holds.</param>
    /// <param name="paths">How many paths lead to a pixel: 4 or 8.</param>
    /// <param name="large">The large penalty.</param>
    public FusedLayout(PictureSize size, DisparityRange range, int laneBytes, int paths, int large)
    {
        (Width, Height, Least, Count, Paths) = (size.Width, size.Height, range.Least, range.Count, paths);
        Lanes = Whole(Count, laneBytes);
        SlotBytes = Whole(Count + 1, laneBytes);
        Planes = paths / 2 * large <= byte.MaxValue ? 1 : paths / 4;
        Margin = Math.Max(0, -Least);
        LineBytes = Margin + Width + Math.Max(0, Least) + Lanes + 64;
    }

    public int Width { get; }

    public int Height { get; }

    public int Least { get; }

    public int Count { get; }

    /// <summary>How many paths lead to a pixel.</summary>
    public int Paths { get; }

    /// <summary>How many lanes a pixel has: its disparities up to a whole vector.</summary>
    public int Lanes { get; }

    /// <summary>The bytes from one pixel's path costs to the next one's: at least one lane behind the last disparity keeps the two apart.</summary>
    public int SlotBytes { get; }

    /// <summary>
    /// How many bytes the sum of a sweep's path costs takes per lane. What a path adds to the pixel's own cost is at most the large penalty, so
    /// that the sum over all paths of a sweep often fits into one byte without loss; else each pair of paths has its own.
    /// </summary>
    public int Planes { get; }

    /// <summary>The bytes of a pixel's sums.</summary>
    public int SumBytes => Lanes * Planes;

    /// <summary>The bytes of a row of sums.</summary>
    public long RowBytes => (long)Width * SumBytes;

    /// <summary>Bytes before the first pixel of a line of the right picture.</summary>
    public int Margin { get; }

    /// <summary>
    /// The bytes of a line of the right picture. It stands mirrored, so that a growing disparity is a growing address: right column r stands at
    /// <see cref="Margin"/> + Width − 1 − r, and the disparities of left column u begin at <see cref="First"/>.
    /// </summary>
    public int LineBytes { get; }

    /// <summary>The bytes of the path costs that a sweep carries from row to row.</summary>
    public long CarriedBytes => (long)(Paths / 2 - 1) * (Width * (long)SlotBytes + Width);

    /// <summary>The bytes of the map: disparity, confidence and label.</summary>
    public long ResultBytes => (long)Width * Height * (2 * sizeof(float) + sizeof(DisparityLabel));

    /// <summary>Where in a line of the right picture the disparities of a left column begin.</summary>
    public int First(int u) => Margin + Width - 1 - u + Least;

    /// <summary>Whether every disparity of a left column falls on the right picture.</summary>
    public bool IsInside(int u) => u - Least < Width && u - Least - Count + 1 >= 0;

    private static int Whole(int count, int of) => (count + of - 1) / of * of;
}
