using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Measurement;

/// <summary>How a long thing lies, from its outline in the left picture.</summary>
public static class GrainDirection
{
    /// <summary>The direction across the long sides of a region's outline, as it lies on a measured surface; a unit vector in the left camera's own frame.</summary>
    /// <param name="region">The region, longer than it is wide.</param>
    /// <param name="surface">Points measured within it.</param>
    /// <remarks>
    /// The outline's rays are dropped on the plane of the points, and the outline's edges along its long axis are added up. An outline knows the direction of a plank's edges better than
    /// measured points do, some of which are always missing; and it matters: a direction that is off by ε turns a cup c over width w and length l into a twist of 8·c·ε·l/w.
    /// </remarks>
    /// <exception cref="UserErrorException">The points came without a rig, or the outline has no long side.</exception>
    public static Vector3D AcrossGrain(this SceneRegion region, MeasuredPoints surface)
    {
        ArgumentNullException.ThrowIfNull(region);
        ArgumentNullException.ThrowIfNull(surface);
        var camera = surface.Rig?.Left ?? throw new UserErrorException(
            $"The outline of '{region.Name}' is told in raw pixels, but the points came without a rig; rectify the raw pair with its rig.");
        var plane = surface.FitPlane();
        var corners = region.Outline.Select(pixel =>
        {
            var ray = camera.Ray(camera.Undistort(pixel));
            return plane.Normal.Dot(plane.Centroid) / plane.Normal.Dot(ray) * ray;
        }).ToArray();
        var edges = corners.Select((corner, i) => corners[(i + 1) % corners.Length] - corner).ToArray();

        // The long axis in two steps: the edges' directions doubled in angle have the long sides' as their mean, whichever way each edge runs.
        var first = edges.MaxBy(edge => edge.Norm).Normalized;
        var second = plane.Normal.Cross(first);
        var (cosine, sine) = (0.0, 0.0);
        foreach (var edge in edges)
        {
            var angle = 2 * Math.Atan2(edge.Dot(second), edge.Dot(first));
            (cosine, sine) = (cosine + edge.Norm * Math.Cos(angle), sine + edge.Norm * Math.Sin(angle));
        }

        if (Math.Sqrt(cosine * cosine + sine * sine) < 0.1 * edges.Sum(edge => edge.Norm))
        {
            throw new UserErrorException($"The outline of '{region.Name}' is as wide as it is long, so its grain is not told by it; give the direction across the grain.");
        }

        var half = Math.Atan2(sine, cosine) / 2;
        var axis = Math.Cos(half) * first + Math.Sin(half) * second;
        var along = edges.Where(edge => Math.Abs(edge.Dot(axis)) > 0.7 * edge.Norm)
            .Aggregate(default(Vector3D), (sum, edge) => edge.Dot(axis) < 0 ? sum - edge : sum + edge).Normalized;
        return plane.Normal.Cross(along);
    }
}
