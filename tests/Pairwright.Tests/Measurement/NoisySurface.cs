using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Measurement;

namespace Pairwright.Tests.Measurement;

/// <summary>Depth maps of known surfaces, with disparity noise that neighbouring pixels share as they share window content.</summary>
internal static class NoisySurface
{
    /// <summary>A window of this many pixels' noise is averaged, so that errors correlate as a triangle of this length.</summary>
    public const int Window = 7;

    public static RectifiedGeometry Geometry(int width, int height) => new(600, 200, 0, width / 2.0, height / 2.0, new(width, height));

    /// <summary>The depth map of the surface Z(x, y) in millimetres, with a rig that is known exactly.</summary>
    public static DepthMap Of(int width, int height, Func<double, double, double> depth, double sigma, Random random, double wrongShare = 0, bool stateSigma = true)
    {
        var geometry = Geometry(width, height);
        var noise = Correlated(width, height, random);
        var disparity = ScalarMap.From(geometry.Size, (u, v) =>
            (float)(geometry.Disparity(Along(geometry, u, v, depth)) + sigma * noise[v * width + u] + (random.NextDouble() < wrongShare ? 20 * random.NextDouble() : 0)));
        var camera = new Camera(new(600, 600, width / 2.0, height / 2.0), geometry.Size);
        var rig = new Rig(camera, camera, new(Matrix3x3.Identity, new(-200, 0, 0)), TestRig.Exact);
        return new(
            disparity, geometry, new Rectification(rig, geometry), stateSigma ? ScalarMap.From(geometry.Size, (_, _) => (float)sigma) : null, Window);
    }

    // The depth at which the ray of a pixel meets the surface: the surface is nearly level, so that repeating Z(x, y) settles.
    private static double Along(RectifiedGeometry geometry, int u, int v, Func<double, double, double> depth)
    {
        var z = depth(0, 0);
        for (var i = 0; i < 60; i++)
        {
            z = depth((u - geometry.CentreU) * z / geometry.FocalPixels, (v - geometry.CentreV) * z / geometry.FocalPixels);
        }

        return z;
    }

    // White noise averaged over the window, at unit variance.
    private static double[] Correlated(int width, int height, Random random)
    {
        var white = Enumerable.Range(0, (width + Window) * (height + Window)).Select(_ => TestRig.Gauss(random)).ToArray();
        var alongRows = new double[width * (height + Window)];
        for (var v = 0; v < height + Window; v++)
        {
            for (var u = 0; u < width; u++)
            {
                for (var k = 0; k < Window; k++)
                {
                    alongRows[v * width + u] += white[v * (width + Window) + u + k] / Window;
                }
            }
        }

        var noise = new double[width * height];
        for (var i = 0; i < noise.Length; i++)
        {
            for (var k = 0; k < Window; k++)
            {
                noise[i] += alongRows[i + k * width];
            }
        }

        return noise;
    }
}
