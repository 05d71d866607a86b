using System.Runtime.CompilerServices;
using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>The directions (x, y, 1) of every sub-pixel of a camera, by exact undistortion, kept for the next capture with the same camera.</summary>
internal sealed class RayField
{
    private static readonly ConditionalWeakTable<Camera, Dictionary<int, RayField>> Known = new();

    // Single precision holds a direction to 2e-5 px at a focal length of 1500 px, far below what a picture shows.
    private readonly float[] x;
    private readonly float[] y;

    private RayField(Camera camera, int across, ParallelOptions threads)
    {
        var (width, height) = (camera.Size.Width * across, camera.Size.Height * across);
        (Width, Height) = (width, height);
        (x, y) = (new float[width * height], new float[width * height]);
        var k = camera.Matrix;
        Parallel.For(0, height, threads, row =>
        {
            var v = (row + 0.5) / across - 0.5;
            for (var column = 0; column < width; column++)
            {
                var u = (column + 0.5) / across - 0.5;
                var direction = camera.Distortion.Undistort((u - k.CentreU) / k.FocalU, (v - k.CentreV) / k.FocalV);
                var index = row * width + column;
                (x[index], y[index]) = direction is var (a, b) ? ((float)a, (float)b) : (float.NaN, float.NaN);
            }
        });
    }

    public int Width { get; }

    public int Height { get; }

    public static RayField Of(Camera camera, int across, ParallelOptions threads)
    {
        var fields = Known.GetOrCreateValue(camera);
        lock (fields)
        {
            if (!fields.TryGetValue(across, out var field))
            {
                fields[across] = field = new(camera, across, threads);
            }

            return field;
        }
    }

    /// <summary>The direction of a sub-pixel; NaN outside the lens model's valid field.</summary>
    public Vector3D this[int column, int row] => new(x[row * Width + column], y[row * Width + column], 1);
}
