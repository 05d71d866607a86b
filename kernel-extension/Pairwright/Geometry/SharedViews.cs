using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>Finds what both cameras of a rig see.</summary>
internal static class SharedViews
{
    private const int Rows = 400;

    // A direction flatter than this against the plane is taken as this flat: it meets the plane far outside any shared area.
    private const double FlattestSlope = 1e-3;

    public static SharedView At(Rig rig, double depthMm)
    {
        if (!(depthMm > 0) || !double.IsFinite(depthMm))
        {
            throw new UserErrorException($"A depth of {depthMm} mm is not in front of the camera; give a depth above zero in millimetres.");
        }

        var left = OnPlane(rig, View.Left, depthMm)!;
        var (leftArea, area) = (0.0, 0.0);
        List<Vector3D> rising = [], falling = [];
        var height = (left.Bottom - left.Top) / Rows;
        var right = OnPlane(rig, View.Right, depthMm);
        for (var row = 0; row < Rows; row++)
        {
            var y = left.Top + (row + 0.5) * height;
            var span = left.Span(y);
            leftArea += Math.Max(0, span.High - span.Low) * height;
            var other = right?.Span(y) ?? (1, 0);
            var (low, high) = (Math.Max(span.Low, other.Low), Math.Min(span.High, other.High));
            if (low < high)
            {
                area += (high - low) * height;
                rising.Add(new(low, y, depthMm));
                falling.Add(new(high, y, depthMm));
            }
        }

        rising.Reverse();
        return new(depthMm, [.. falling, .. rising], area, area / leftArea);
    }

    public static double? NearestDepth(Rig rig)
    {
        // From a hundredth of a baseline up in steps of five percent, then halved: the overlap grows steadily from where it begins.
        const double growth = 1.05;
        var (blind, depth) = (0.0, 0.01 * rig.BaselineMm);
        while (!Overlaps(rig, depth))
        {
            (blind, depth) = (depth, growth * depth);
            if (depth > 1e4 * rig.BaselineMm)
            {
                return null;
            }
        }

        for (var halving = 0; halving < 40 && blind > 0; halving++)
        {
            var middle = (blind + depth) / 2;
            (blind, depth) = Overlaps(rig, middle) ? (blind, middle) : (middle, depth);
        }

        return depth;
    }

    private static bool Overlaps(Rig rig, double depthMm)
    {
        if (OnPlane(rig, View.Right, depthMm) is not { } right)
        {
            return false;
        }

        var left = OnPlane(rig, View.Left, depthMm)!;
        var (top, bottom) = (Math.Max(left.Top, right.Top), Math.Min(left.Bottom, right.Bottom));
        const int rows = 64;
        for (var row = 0; row < rows && top < bottom; row++)
        {
            var y = top + (row + 0.5) / rows * (bottom - top);
            var (a, b) = (left.Span(y), right.Span(y));
            if (Math.Max(a.Low, b.Low) < Math.Min(a.High, b.High))
            {
                return true;
            }
        }

        return false;
    }

    // Nothing where the plane lies behind the camera.
    private static PlaneOutline? OnPlane(Rig rig, View view, double depthMm)
    {
        var centre = view == View.Left ? default : rig.RightCentreInLeft;
        return depthMm > centre.Z
            ? new(rig[view].Border.Select(pixel =>
            {
                var direction = rig.Ray(view, pixel).Direction;
                var scale = (depthMm - centre.Z) / Math.Max(direction.Z, FlattestSlope);
                return (centre.X + scale * direction.X, centre.Y + scale * direction.Y);
            }))
            : null;
    }
}
