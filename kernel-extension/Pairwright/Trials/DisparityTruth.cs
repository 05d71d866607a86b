using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Simulation;

namespace Pairwright.Trials;

/// <summary>The true disparity of each pixel of a left rectified picture, with what the right camera does not see.</summary>
/// <remarks>d = u_left − u_right, in pixels; NaN where the truth is not known. Immutable.</remarks>
public sealed class DisparityTruth
{
    /// <summary>A difference of neighbouring true disparities above this, in pixels, is a jump in depth (Scharstein and Szeliski 2002: 2).</summary>
    public const double JumpPx = 2;

    /// <summary>How far from a jump a pixel counts as near it, in pixels (Scharstein and Szeliski 2002: a window of 9).</summary>
    public const int EdgeReachPx = 4;

    /// <summary>
    /// A pixel is plain when the squared gradient along the row, averaged over 3 × 3 pixels, is below this, in squared levels of the 8-bit scale
    /// (Scharstein and Szeliski 2002: 4).
    /// </summary>
    public const double PlainBelow = 4;

    /// <summary>Makes a truth.</summary>
    /// <param name="disparity">The true disparities, NaN where they are not known.</param>
    /// <param name="occluded">
    /// Which pixels the right camera does not see; when left out, those that a nearer part of the truth hides and those whose match lies beside
    /// the right picture.
    /// </param>
    /// <param name="resolutionPx">The step in which the true disparities are given, in pixels: 1 for whole ones, 0 for exact ones.</param>
    /// <param name="provenance">Where it came from.</param>
    /// <exception cref="UserErrorException">The sizes differ, the resolution is negative, or no pixel has a truth.</exception>
    public DisparityTruth(ScalarMap disparity, Mask? occluded = null, double resolutionPx = 0, Provenance? provenance = null)
    {
        ArgumentNullException.ThrowIfNull(disparity);
        if (occluded is not null && occluded.Size != disparity.Size)
        {
            throw new UserErrorException($"A mask of occlusions of {occluded.Size} px does not fit true disparities of {disparity.Size} px; give one of their size.");
        }

        if (!(resolutionPx >= 0) || !double.IsFinite(resolutionPx))
        {
            throw new UserErrorException($"A resolution of {resolutionPx} px is not one; give the step of the true disparities, 0 where they are exact.");
        }

        if (!(disparity.ValidShare > 0))
        {
            throw new UserErrorException("No pixel has a true disparity, so nothing can be judged; check the file and its scale.");
        }

        (Disparity, Occluded, ResolutionPx) = (disparity, occluded ?? HiddenBehind(disparity), resolutionPx);
        Provenance = provenance ?? Provenance.None;
        NearDepthEdges = NearJumps(disparity);
    }

    /// <summary>The true disparities in pixels; NaN where they are not known.</summary>
    public ScalarMap Disparity { get; }

    /// <summary>Which pixels the right camera does not see.</summary>
    public Mask Occluded { get; }

    /// <summary>Which pixels lie within <see cref="EdgeReachPx"/> of a jump in depth, seen by both cameras or not.</summary>
    public Mask NearDepthEdges { get; }

    /// <summary>The step in which the true disparities are given, in pixels; errors below it are not judged.</summary>
    public double ResolutionPx { get; }

    /// <summary>Where it came from.</summary>
    public Provenance Provenance { get; }

    /// <summary>Reads true disparities.</summary>
    /// <param name="path">A .pfm or floating-point .tif file, in pixels; or a .png file of 8 or 16 bits, where level 0 is no truth.</param>
    /// <param name="levelsPerPixel">How many levels of a PNG make one pixel of disparity: 256 in 16 bits when left out; to be stated for 8 bits.</param>
    /// <param name="occludedPath">A picture in which every level but black marks what the right camera does not see.</param>
    /// <exception cref="UserErrorException">A file is missing, broken or of another size, or the scale is not stated.</exception>
    public static DisparityTruth Read(string path, double? levelsPerPixel = null, string? occludedPath = null)
    {
        ArgumentNullException.ThrowIfNull(path);
        var isPng = Path.GetExtension(path).Equals(".png", StringComparison.OrdinalIgnoreCase);
        if (isPng && levelsPerPixel is null && Picture.Read(path).SignificantBits <= 8)
        {
            throw new UserErrorException($"'{path}' holds 8-bit levels, whose scale differs from set to set; state how many levels make one pixel of disparity.");
        }

        var factor = levelsPerPixel ?? MapFile.DefaultPngFactor;
        return new(
            MapFile.Read(path, factor),
            occludedPath is null ? null : Mask.Read(occludedPath),
            isPng ? 1 / factor : 0,
            Provenance.OfFile(path));
    }

    /// <summary>The truth of a simulated capture.</summary>
    /// <param name="truth">What the rectified pair truly shows.</param>
    public static DisparityTruth Of(SceneTruth truth)
    {
        ArgumentNullException.ThrowIfNull(truth);
        return new(truth.Disparity, Mask.From(truth.Disparity.Size, (u, v) => !truth.VisibleInBoth[u, v]), provenance: Provenance.None.Then("simulate", "the scene's own truth"));
    }

    /// <summary>Which pixels belong to a region, among those whose truth is known.</summary>
    /// <param name="region">The region.</param>
    /// <param name="left">The left rectified picture, which says what is plain.</param>
    /// <exception cref="UserErrorException">The picture has another size than the truth.</exception>
    public Mask Region(TruthRegion region, Picture left)
    {
        ArgumentNullException.ThrowIfNull(left);
        if (left.Size != Disparity.Size)
        {
            throw new UserErrorException($"True disparities of {Disparity.Size} px do not fit a picture of {left.Size} px; give those of this picture.");
        }

        bool Known(int u, int v) => !float.IsNaN(Disparity[u, v]);
        bool Seen(int u, int v) => Known(u, v) && !Occluded[u, v];
        return region switch
        {
            TruthRegion.All => Mask.From(Disparity.Size, Known),
            TruthRegion.Unoccluded => Mask.From(Disparity.Size, Seen),
            TruthRegion.NearDepthEdges => Mask.From(Disparity.Size, (u, v) => Seen(u, v) && NearDepthEdges[u, v]),
            TruthRegion.Plain when PlainPixels(left) is var plain => Mask.From(Disparity.Size, (u, v) => Seen(u, v) && plain[u, v]),
            _ => throw new ArgumentOutOfRangeException(nameof(region)),
        };
    }

    // Every left pixel paints its disparity onto the right columns that it covers; who finds a nearer one there is hidden behind it.
    private static Mask HiddenBehind(ScalarMap disparity)
    {
        var size = disparity.Size;
        var hidden = new bool[size.Area];
        var nearest = new float[size.Width];
        for (var v = 0; v < size.Height; v++)
        {
            var row = disparity.Row(v);
            nearest.AsSpan().Fill(float.NegativeInfinity);
            for (var u = 0; u < row.Length; u++)
            {
                foreach (var x in Columns(u - row[u], size.Width))
                {
                    nearest[x] = Math.Max(nearest[x], row[u]);
                }
            }

            for (var u = 0; u < row.Length; u++)
            {
                // By more than a pixel: the next part of a slanted surface hides nothing.
                var here = row[u];
                hidden[v * size.Width + u] = !float.IsNaN(here) && Columns(u - here, size.Width).All(x => nearest[x] > here + 1);
            }
        }

        return new(size, hidden);
    }

    private static IEnumerable<int> Columns(float x, int width)
    {
        if (!float.IsNaN(x) && x > -0.5f && x < width - 0.5f)
        {
            var first = (int)Math.Floor(x);
            if (first >= 0)
            {
                yield return first;
            }

            if (x > first && first + 1 < width)
            {
                yield return first + 1;
            }
        }
    }

    private static Mask NearJumps(ScalarMap disparity)
    {
        var (width, height) = (disparity.Size.Width, disparity.Size.Height);
        var jumps = new bool[disparity.Size.Area];

        // A comparison with NaN is false: where the truth ends there is no jump.
        void Mark(int here, int there)
        {
            if (Math.Abs(disparity.Values[here] - disparity.Values[there]) > JumpPx)
            {
                (jumps[here], jumps[there]) = (true, true);
            }
        }

        for (var v = 0; v < height; v++)
        {
            for (var u = 0; u < width; u++)
            {
                var i = v * width + u;
                if (u + 1 < width)
                {
                    Mark(i, i + 1);
                }

                if (v + 1 < height)
                {
                    Mark(i, i + width);
                }
            }
        }

        return new(disparity.Size, Widened(Widened(jumps, width, height, across: true), width, height, across: false));
    }

    private static bool[] Widened(bool[] marks, int width, int height, bool across)
    {
        var wide = new bool[marks.Length];
        for (var v = 0; v < height; v++)
        {
            for (var u = 0; u < width; u++)
            {
                for (var k = -EdgeReachPx; k <= EdgeReachPx; k++)
                {
                    var (x, y) = across ? (u + k, v) : (u, v + k);
                    wide[v * width + u] |= x >= 0 && y >= 0 && x < width && y < height && marks[y * width + x];
                }
            }
        }

        return wide;
    }

    private static Mask PlainPixels(Picture left)
    {
        var (width, height) = (left.Size.Width, left.Size.Height);
        var scale = 1.0 / (1 << (left.SignificantBits - 8));
        double Square(int u, int v)
        {
            var gradient = scale * (left[Math.Min(u + 1, width - 1), v] - left[Math.Max(u - 1, 0), v]) / 2;
            return gradient * gradient;
        }

        var squares = ScalarMap.From(left.Size, (u, v) => (float)Square(u, v));
        return Mask.From(left.Size, (u, v) =>
        {
            var (sum, count) = (0.0, 0);
            for (var row = Math.Max(v - 1, 0); row <= Math.Min(v + 1, height - 1); row++)
            {
                for (var column = Math.Max(u - 1, 0); column <= Math.Min(u + 1, width - 1); column++)
                {
                    (sum, count) = (sum + squares[column, row], count + 1);
                }
            }

            return sum / count < PlainBelow;
        });
    }
}
