using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Measurement;

/// <summary>Points in the left camera's own frame, in millimetres, with colours and the random σ of their position where they are known.</summary>
public sealed class PointCloud
{
    /// <summary>Makes a cloud.</summary>
    /// <param name="positions">The points in the left camera's own frame, in millimetres.</param>
    /// <param name="rgb">Red, green, blue by turns, three bytes a point; empty for none.</param>
    /// <param name="sigmaMm">The random standard uncertainty along each point's ray, in millimetres; empty where it is not known.</param>
    /// <param name="provenance">Where the cloud came from.</param>
    /// <exception cref="ArgumentException">The numbers of points, colours and uncertainties do not fit.</exception>
    public PointCloud(ImmutableArray<Vector3D> positions, ImmutableArray<byte> rgb = default, ImmutableArray<float> sigmaMm = default, Provenance? provenance = null)
    {
        (Positions, Rgb, SigmaMm) = (positions, rgb.IsDefault ? [] : rgb, sigmaMm.IsDefault ? [] : sigmaMm);
        Provenance = provenance ?? Provenance.None;
        if ((!Rgb.IsEmpty && Rgb.Length != 3 * Positions.Length) || (!SigmaMm.IsEmpty && SigmaMm.Length != Positions.Length))
        {
            throw new ArgumentException($"{Positions.Length} points do not go with {Rgb.Length} colour bytes and {SigmaMm.Length} uncertainties.");
        }
    }

    /// <summary>The points in the left camera's own frame, in millimetres.</summary>
    public ImmutableArray<Vector3D> Positions { get; }

    /// <summary>Red, green, blue by turns, three bytes a point; empty for none.</summary>
    public ImmutableArray<byte> Rgb { get; }

    /// <summary>The random standard uncertainty along each point's ray, in millimetres; empty where it is not known.</summary>
    public ImmutableArray<float> SigmaMm { get; }

    /// <summary>Where the cloud came from.</summary>
    public Provenance Provenance { get; }

    /// <summary>The number of points.</summary>
    public int Count => Positions.Length;

    /// <summary>The upright box around the points; NaN where there are none.</summary>
    public BoundingBox Bounds
    {
        get
        {
            var none = new Vector3D(double.NaN, double.NaN, double.NaN);
            if (Count == 0)
            {
                return new(none, none);
            }

            var (least, most) = (Positions[0], Positions[0]);
            foreach (var p in Positions)
            {
                least = new(Math.Min(least.X, p.X), Math.Min(least.Y, p.Y), Math.Min(least.Z, p.Z));
                most = new(Math.Max(most.X, p.X), Math.Max(most.Y, p.Y), Math.Max(most.Z, p.Z));
            }

            return new(least, most);
        }
    }

    /// <summary>Every pixel of a depth map that has a depth, with the colour of its rectified left picture.</summary>
    public static PointCloud From(DepthMap map)
    {
        ArgumentNullException.ThrowIfNull(map);
        var kept = Enumerable.Range(0, (int)map.Size.Area).Where(i => float.IsFinite(map.Z.Values[i])).ToArray();
        var width = map.Size.Width;
        var positions = kept.Select(i => map.Geometry.PointInLeftCamera(new(i % width, i / width), map.Disparity.Values[i])).ToImmutableArray();
        var rgb = map.Picture is { } picture ? kept.SelectMany(i => Colour(picture, i)).ToImmutableArray() : [];

        // Along the ray: longer than along the axis by the ray's slope.
        var sigma = map.Sigma is { } known
            ? kept.Zip(positions, (i, p) => (float)(known.Values[i] * p.Norm / map.Z.Values[i])).ToImmutableArray()
            : [];
        return new(positions, rgb, sigma, map.Provenance.Then("point cloud"));
    }

    /// <summary>The cloud with at most one point in every cube of a grid: the one nearest to the mean of those that lie in the cube.</summary>
    /// <param name="cubeMm">The side of the cubes, in millimetres, above zero.</param>
    /// <exception cref="UserErrorException">The side is not above zero.</exception>
    public PointCloud Thinned(double cubeMm)
    {
        if (!(cubeMm > 0))
        {
            throw new UserErrorException($"A cube of {cubeMm} mm thins nothing; give a side above zero.");
        }

        var kept = Enumerable.Range(0, Count)
            .GroupBy(i => (Math.Floor(Positions[i].X / cubeMm), Math.Floor(Positions[i].Y / cubeMm), Math.Floor(Positions[i].Z / cubeMm)))
            .Select(cube =>
            {
                var mean = cube.Aggregate(default(Vector3D), (sum, i) => sum + Positions[i]) / cube.Count();
                return cube.MinBy(i => (Positions[i] - mean).Norm);
            });
        return Picked([.. kept], $"one point in {MeasuredText.Plain(cubeMm)} mm");
    }

    /// <summary>The cloud with about so many points, evenly taken in their order; the same cloud where it has no more.</summary>
    /// <param name="most">The greatest number of points, above zero.</param>
    public PointCloud ThinnedTo(int most)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(most);
        return Count <= most ? this : Picked([.. Enumerable.Range(0, most).Select(i => (int)((long)i * Count / most))], $"{most} points");
    }

    /// <summary>Writes a binary PLY file: positions in the left camera's own frame in millimetres, colours and σ where they are known.</summary>
    /// <param name="path">The file, replaced only when the new one is whole.</param>
    /// <exception cref="UserErrorException">The file cannot be written.</exception>
    public void ToPly(string path) => PointFile.Write(path, Positions.AsSpan(), Rgb.AsSpan(), SigmaMm.AsSpan(), "frame of the left camera: X right, Y down, Z forward");

    /// <summary>The number of points and their box.</summary>
    public override string ToString()
    {
        var (bounds, size) = (Bounds, Bounds.Size);
        return $"cloud of {Count} points, {MeasuredText.Plain(size.X)} × {MeasuredText.Plain(size.Y)} × {MeasuredText.Plain(size.Z)} mm, "
            + $"{MeasuredText.Plain(bounds.Least.Z)} to {MeasuredText.Plain(bounds.Most.Z)} mm before the left camera; left camera's frame";
    }

    private PointCloud Picked(int[] kept, string how) => new(
        [.. kept.Select(i => Positions[i])],
        Rgb.IsEmpty ? [] : [.. kept.SelectMany(i => new[] { Rgb[3 * i], Rgb[3 * i + 1], Rgb[3 * i + 2] })],
        SigmaMm.IsEmpty ? [] : [.. kept.Select(i => SigmaMm[i])],
        Provenance.Then("thinned", how));

    // Shown with eight bits, whatever the picture has.
    private static byte[] Colour(Picture picture, int pixel)
    {
        var shift = picture.SignificantBits - 8;
        return picture.HasColour
            ? [.. Enumerable.Range(3 * pixel, 3).Select(i => (byte)(picture.Colour[i] >> shift))]
            : [.. Enumerable.Repeat((byte)(picture.Grey[pixel] >> shift), 3)];
    }
}
