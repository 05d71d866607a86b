using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The census transform of a picture's rows, four bits to a byte, as the fused matcher looks them up.</summary>
/// <remarks>
/// The bits are those of <see cref="CensusTransform"/>, or of the centre-symmetric transform, in the same order; plane p holds bits 4p to 4p + 3.
/// </remarks>
internal sealed unsafe class CensusNibbles : IDisposable
{
    private const int Step = 32;

    // Room for the widest window on either side, and for whole steps behind the last column.
    private const int Side = 32;

    private readonly Picture picture;
    private readonly bool mirrored;
    private readonly bool masked;
    private readonly (int Row, int Column, int OtherRow, int OtherColumn)[] comparisons;
    private readonly int windowHeight;
    private readonly int lineWords;
    private readonly AlignedMemory lines;
    private readonly int[] held;

    /// <param name="picture">The picture.</param>
    /// <param name="window">The window.</param>
    /// <param name="centreSymmetric">Whether opposite pixels are compared with each other instead of all with the middle.</param>
    /// <param name="mirrored">Whether columns run from right to left.</param>
    public CensusNibbles(Picture picture, PictureSize window, bool centreSymmetric, bool mirrored)
    {
        (this.picture, this.mirrored, masked, windowHeight) = (picture, mirrored, !centreSymmetric && picture.Usable is not null, window.Height);
        var places = from dv in Enumerable.Range(0, window.Height)
                     from du in Enumerable.Range(-(window.Width / 2), window.Width)
                     where (du, dv) != (0, window.Height / 2)
                     select (Row: dv, Column: mirrored ? -du : du);
        comparisons = centreSymmetric
            ? [.. places.Take(window.Width * window.Height / 2).Select(place => (place.Row, place.Column, window.Height - 1 - place.Row, -place.Column))]
            : [.. places.Select(place => (place.Row, place.Column, window.Height / 2, 0))];
        lineWords = picture.Size.Width + Step + 2 * Side;
        lines = new(sizeof(short) * (long)lineWords * windowHeight);
        held = [.. Enumerable.Repeat(-1, windowHeight)];
    }

    /// <summary>How many planes a row has.</summary>
    public int Planes => (comparisons.Length + 3) / 4;

    /// <summary>Fills the planes of a row; up to <see cref="Step"/> columns more than the picture has are written.</summary>
    /// <param name="v">The row.</param>
    /// <param name="planes">Where the first column of the first plane goes.</param>
    /// <param name="planeBytes">From one plane to the next.</param>
    public void Fill(int v, byte* planes, nint planeBytes)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var rows = stackalloc short*[windowHeight];
        for (var i = 0; i < windowHeight; i++)
        {
            rows[i] = Line(Math.Clamp(v + i - windowHeight / 2, 0, height - 1));
        }

        for (var u = 0; u < width; u += Step)
        {
            for (int plane = 0, next = 0; plane < Planes; plane++)
            {
                var (first, last) = (Vector256<short>.Zero, Vector256<short>.Zero);
                for (var bit = 0; bit < 4 && next < comparisons.Length; bit++, next++)
                {
                    var (row, column, otherRow, otherColumn) = comparisons[next];
                    var here = rows[row] + u + column;
                    var other = rows[otherRow] + u + otherColumn;
                    var one = Vector256.Create((short)(1 << bit));
                    first |= Vector256.LessThan(Vector256.Load(here), Vector256.Load(other)) & one;
                    last |= Vector256.LessThan(Vector256.Load(here + 16), Vector256.Load(other + 16)) & one;
                }

                Vector256.Narrow(first.AsUInt16(), last.AsUInt16()).Store(planes + plane * planeBytes + u);
            }
        }
    }

    public void Dispose() => lines.Dispose();

    // A row with its border repeated on either side. Levels are shifted down by half their scale, since vectors compare signed words; a pixel that
    // is not usable stands at the top of the scale, so that it is darker than none.
    private short* Line(int v)
    {
        var slot = v % windowHeight;
        var line = (short*)lines.Start + (long)slot * lineWords + Side;
        if (held[slot] == v)
        {
            return line;
        }

        held[slot] = v;
        var width = picture.Size.Width;
        var levels = new Span<short>(line, width);
        MemoryMarshal.Cast<ushort, short>(picture.Grey.Slice(v * width, width)).CopyTo(levels);
        for (var u = 0; u < width; u++)
        {
            levels[u] ^= short.MinValue;
        }

        if (masked)
        {
            var usable = picture.Usable!;
            for (var u = 0; u < width; u++)
            {
                levels[u] = usable[u, v] ? levels[u] : short.MaxValue;
            }
        }

        if (mirrored)
        {
            levels.Reverse();
        }

        new Span<short>(line - Side, Side).Fill(levels[0]);
        new Span<short>(line + width, Side + Step).Fill(levels[^1]);
        return line;
    }
}
