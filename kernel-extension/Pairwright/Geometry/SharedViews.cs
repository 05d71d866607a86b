using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>Finds what both cameras of a rig see.</summary>
internal sealed class SharedViews
{
    private const int Rows = 100;

    // A direction flatter than this against the plane is taken as this flat: it meets the plane far outside any shared area.
    private const double FlattestSlope = 1e-3;

    private readonly Vector3D centre;
    private readonly Vector3D[] left;
    private readonly Vector3D[] right;

    // Directions along the border of each picture, in the left camera's frame.
    private SharedViews(Rig rig)
    {
        centre = rig.RightCentreInLeft;
        left = [.. rig.Left.Border.Select(pixel => rig.Ray(View.Left, pixel).Direction)];
        right = [.. rig.Right.Border.Select(pixel => rig.Ray(View.Right, pixel).Direction)];
    }

    public static SharedView At(Rig rig, double depthMm)
    {
        if (!(depthMm > 0) || !double.IsFinite(depthMm))
        {
            throw new UserErrorException($"A depth of {depthMm} mm is not in front of the camera; give a depth above zero in millimetres.");
        }

        var views = new SharedViews(rig);
        var left = OnPlane(default, views.left, depthMm)!;
        var shared = views.SharedAt(depthMm);
        return new(
            depthMm,
            [
                .. shared.Select(row => new Vector3D(row.High, row.Y, depthMm)),
                .. Enumerable.Reverse(shared).Select(row => new Vector3D(row.Low, row.Y, depthMm)),
            ],
            Area(shared),
            Area(shared) / Area(Shared(left, left)));
    }

    public static double? NearestDepth(Rig rig)
    {
        // From a hundredth of a baseline up in steps of a fifth, then halved: the overlap grows steadily from where it begins.
        const double growth = 1.2;
        var views = new SharedViews(rig);
        var (blind, depth) = (0.0, 0.01 * rig.BaselineMm);
        while (views.SharedAt(depth).Count == 0)
        {
            (blind, depth) = (depth, growth * depth);
            if (depth > 1e4 * rig.BaselineMm)
            {
                return null;
            }
        }

        for (var halving = 0; halving < 30 && blind > 0; halving++)
        {
            var middle = (blind + depth) / 2;
            (blind, depth) = views.SharedAt(middle).Count > 0 ? (blind, middle) : (middle, depth);
        }

        return depth;
    }

    private List<(double Y, double Low, double High)> SharedAt(double depthMm) =>
        OnPlane(centre, right, depthMm) is { } seenByRight ? Shared(OnPlane(default, left, depthMm)!, seenByRight) : [];

    // Row by row what two outlines share, from the first to the last height that both reach; neighbouring rows bound a strip.
    private static List<(double Y, double Low, double High)> Shared(PlaneOutline a, PlaneOutline b)
    {
        // At its very top and bottom an outline may be a point.
        const double drawnIn = 1e-6;
        var (top, bottom) = (Math.Max(a.Top, b.Top), Math.Min(a.Bottom, b.Bottom));
        var rows = new List<(double, double, double)>();
        for (var row = 0; row <= Rows && top < bottom; row++)
        {
            var y = top + Math.Clamp(row / (double)Rows, drawnIn, 1 - drawnIn) * (bottom - top);
            var ((low, high), (otherLow, otherHigh)) = (a.Span(y), b.Span(y));
            (low, high) = (Math.Max(low, otherLow), Math.Min(high, otherHigh));
            if (low < high)
            {
                rows.Add((y, low, high));
            }
        }

        return rows;
    }

    private static double Area(List<(double Y, double Low, double High)> rows)
    {
        var area = 0.0;
        for (var i = 1; i < rows.Count; i++)
        {
            var (above, below) = (rows[i - 1], rows[i]);
            area += (below.Y - above.Y) * (above.High - above.Low + below.High - below.Low) / 2;
        }

        return area;
    }

    // Nothing where the plane lies behind the camera.
    private static PlaneOutline? OnPlane(Vector3D centre, Vector3D[] directions, double depthMm) => depthMm > centre.Z
        ? new(directions.Select(direction =>
        {
            var scale = (depthMm - centre.Z) / Math.Max(direction.Z, FlattestSlope);
            return (centre.X + scale * direction.X, centre.Y + scale * direction.Y);
        }))
        : null;
}
