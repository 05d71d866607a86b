using Pairwright.Geometry;

namespace Pairwright.Matching;

/// <summary>Smooths disparities along the surface that each pixel lies on: a line fitted along its row, then one along its column, so that planes stay as they are.</summary>
internal static class SurfaceSmoothing
{
    // A neighbour farther off lies on another surface.
    private const float SameSurfacePx = 1;

    /// <summary>The smoothed disparities; NaN where there is none.</summary>
    /// <param name="size">The map's size.</param>
    /// <param name="disparity">Row after row, NaN where there is none.</param>
    /// <param name="weights">The weight of each pixel, zero or above; equal when left out.</param>
    /// <param name="radius">How far neighbours count, in pixels.</param>
    /// <param name="options">Threads and stopping.</param>
    public static float[] Of(PictureSize size, float[] disparity, float[]? weights, int radius, ParallelOptions options)
    {
        var (width, height) = (size.Width, size.Height);
        var alongRows = new float[disparity.Length];
        var smooth = new float[disparity.Length];
        Parallel.For(0, height, options, v =>
        {
            for (var u = 0; u < width; u++)
            {
                alongRows[v * width + u] = AtCentre(disparity, weights, v * width + u, 1, Math.Max(-radius, -u), Math.Min(radius, width - 1 - u));
            }
        });
        Parallel.For(0, height, options, v =>
        {
            for (var u = 0; u < width; u++)
            {
                smooth[v * width + u] = AtCentre(alongRows, weights, v * width + u, width, Math.Max(-radius, -v), Math.Min(radius, height - 1 - v));
            }
        });
        return smooth;
    }

    // The height at the centre of the weighted least-squares line through a pixel's neighbours on the same surface; a lone pixel keeps its own.
    private static float AtCentre(float[] disparity, float[]? weights, int centre, int step, int first, int last)
    {
        var own = disparity[centre];
        float n = 0, x = 0, xx = 0, d = 0, dx = 0;
        for (var k = first; k <= last; k++)
        {
            var i = centre + k * step;
            var difference = disparity[i] - own;
            if (Math.Abs(difference) <= SameSurfacePx)
            {
                var weight = weights is null ? 1 : weights[i];
                (n, x, xx) = (n + weight, x + weight * k, xx + weight * k * k);
                (d, dx) = (d + weight * difference, dx + weight * k * difference);
            }
        }

        var determinant = n * xx - x * x;
        return own + (determinant > 1e-3f * n * n ? (d * xx - dx * x) / determinant : n > 0 ? d / n : 0);
    }
}
