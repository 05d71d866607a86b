using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Tests.Measurement;

/// <summary>Rigs with an invented but full covariance, about one of 200 mm baseline and slightly turned-in cameras.</summary>
internal static class TestRig
{
    // The size of a fair calibration's standard deviations, in the order of RigParameters; zero is held fixed.
    private static readonly double[] Sigma =
    [
        0.4, 0.4, 0.5, 0.5, 4e-4, 8e-4, 5e-5, 5e-5, 0, 0, 0, 0,
        0.4, 0.4, 0.5, 0.5, 4e-4, 8e-4, 5e-5, 5e-5, 0, 0, 0, 0,
        2e-4, 3e-4, 5e-5, 0.05, 0.05, 0.1,
    ];

    public static Rig Of(int width = 640, int height = 480, double focal = 700, Matrix<double>? covariance = null, bool distorted = true)
    {
        var lens = distorted ? new Distortion(k1: -0.12, k2: 0.05, p1: 3e-4, p2: -2e-4) : Distortion.None;
        var left = new Camera(new(focal, 1.002 * focal, 0.503 * width, 0.497 * height), new(width, height), lens);
        var right = new Camera(new(1.003 * focal, focal, 0.494 * width, 0.502 * height), new(width, height), lens);
        return new(left, right, Pose.FromVectors(new(0.004, 0.06, -0.003), new(-200, 1.5, 6)), covariance ?? Covariance(1));
    }

    /// <summary>Sigmas with correlations from a seed, of the order of one half; <paramref name="scale"/> multiplies the sigmas.</summary>
    public static Matrix<double> Covariance(double scale, int seed = 5)
    {
        var random = new Random(seed);
        var mixing = Matrix<double>.Build.Dense(30, 30, (i, j) => i == j ? 1 : 0.15 * (2 * random.NextDouble() - 1));
        var correlation = mixing * mixing.Transpose();
        return Matrix<double>.Build.Dense(30, 30, (i, j) =>
            scale * scale * Sigma[i] * Sigma[j] * correlation[i, j] / Math.Sqrt(correlation[i, i] * correlation[j, j]));
    }

    /// <summary>A rig that is known exactly: a covariance of zeros.</summary>
    public static Matrix<double> Exact => Matrix<double>.Build.Dense(30, 30);

    /// <summary>The raw pixels at which a rig sees points.</summary>
    public static (RawPixel[] Left, RawPixel[] Right) Seen(Rig rig, IEnumerable<Vector3D> points)
    {
        var list = points.ToArray();
        return (Array.ConvertAll(list, rig.Left.Project), Array.ConvertAll(list, point => rig.Right.Project(rig.RightFromLeft.Transform(point))));
    }

    /// <summary>Points of a flat rectangle: middle, two directions of length one and the sides' lengths.</summary>
    public static IEnumerable<Vector3D> Grid(Vector3D middle, Vector3D u, Vector3D v, double width, double length, int columns = 12, int rows = 9) =>
        from j in Enumerable.Range(0, rows)
        from i in Enumerable.Range(0, columns)
        select middle + (width * (i / (columns - 1.0) - 0.5) * u) + (length * (j / (rows - 1.0) - 0.5) * v);

    public static double Gauss(Random random) =>
        Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
}
