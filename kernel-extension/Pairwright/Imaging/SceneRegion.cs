using System.Collections.Immutable;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>A named part of a scene as the left camera sees it, with what is known of it beforehand.</summary>
/// <param name="Name">Its name, as it stands in reports.</param>
/// <param name="Outline">A polygon in raw pixels of the left picture, closed from its last point to its first.</param>
/// <param name="ValuesMm">Known lengths by name, in millimetres, such as a step's stated height; may be empty.</param>
public sealed record SceneRegion(string Name, ImmutableArray<RawPixel> Outline, ImmutableSortedDictionary<string, double> ValuesMm)
{
    /// <summary>A known length, in millimetres.</summary>
    /// <param name="name">Its name in the scene sheet.</param>
    /// <exception cref="UserErrorException">The sheet does not state it.</exception>
    public double ValueMm(string name) =>
        ValuesMm.TryGetValue(name, out var value)
            ? value
            : throw new UserErrorException($"The region '{Name}' states no value '{name}'; it states {(ValuesMm.IsEmpty ? "none" : string.Join(", ", ValuesMm.Keys))}.");

    /// <summary>The region's pixels in the left picture of a rectified pair.</summary>
    /// <param name="pair">A pair that was rectified from the raw pictures that the outline belongs to.</param>
    /// <param name="insetPx">How far to stay away from the outline, in pixels: near the edges of things a matcher mixes two surfaces.</param>
    /// <exception cref="UserErrorException">The pair came rectified, so that its raw pixels are not known.</exception>
    public Mask In(RectifiedPair pair, double insetPx = 0)
    {
        ArgumentNullException.ThrowIfNull(pair);
        var rectification = pair.Rectification ?? throw new UserErrorException(
            $"The region '{Name}' is told in raw pixels, but the pair came rectified; rectify the raw pair with its rig.");
        var corners = Outline.Select(pixel => rectification.Rectify(View.Left, rectification.Rig.Left.Undistort(pixel))).ToArray();
        var inside = new bool[pair.Size.Area];
        for (var v = 0; v < pair.Size.Height; v++)
        {
            for (var u = 0; u < pair.Size.Width; u++)
            {
                inside[v * pair.Size.Width + u] = Holds(corners, u, v) && (insetPx <= 0 || DistanceToOutline(corners, u, v) >= insetPx);
            }
        }

        return new(pair.Size, inside);
    }

    // Even-odd rule: a ray to the right crosses the outline an odd number of times.
    private static bool Holds(RectifiedPixel[] corners, double u, double v)
    {
        var isInside = false;
        for (var i = 0; i < corners.Length; i++)
        {
            var (a, b) = (corners[i], corners[(i + 1) % corners.Length]);
            if (a.V > v != b.V > v && u < a.U + (v - a.V) / (b.V - a.V) * (b.U - a.U))
            {
                isInside = !isInside;
            }
        }

        return isInside;
    }

    private static double DistanceToOutline(RectifiedPixel[] corners, double u, double v)
    {
        var nearest = double.PositiveInfinity;
        for (var i = 0; i < corners.Length; i++)
        {
            var (a, b) = (corners[i], corners[(i + 1) % corners.Length]);
            var (du, dv) = (b.U - a.U, b.V - a.V);
            var length = du * du + dv * dv;
            var share = length > 0 ? Math.Clamp(((u - a.U) * du + (v - a.V) * dv) / length, 0, 1) : 0;
            nearest = Math.Min(nearest, Math.Sqrt(Math.Pow(a.U + share * du - u, 2) + Math.Pow(a.V + share * dv - v, 2)));
        }

        return nearest;
    }
}
