using Pairwright.Geometry;

namespace Pairwright.Tests.Geometry;

/// <summary>Rigs and scene points of every kind that an engineer may bring, from a seed.</summary>
internal static class RandomRigs
{
    public const int Count = 1000;

    /// <summary>Rigs of 20 to 500 mm baseline with lenses of five or eight terms, each with points that both cameras see in their valid fields.</summary>
    public static IEnumerable<(Rig Rig, Vector3D[] Points)> WithPoints(int seed, int count = Count, int pointsPerRig = 10)
    {
        var random = new Random(seed);
        for (var made = 0; made < count;)
        {
            var rig = Any(random);
            if (TryPoints(random, rig, pointsPerRig) is { } points)
            {
                made++;
                yield return (rig, points);
            }
        }
    }

    public static Rig Any(Random random)
    {
        var baseline = Between(random, 20, 500);
        var turn = new Vector3D(Between(random, -0.1, 0.1), Between(random, -0.2, 0.2), Between(random, -0.1, 0.1));
        var direction = new Vector3D(-1, Between(random, -0.3, 0.3), Between(random, -0.3, 0.3)).Normalized;
        return new(AnyCamera(random), AnyCamera(random), Pose.FromVectors(turn, baseline * direction));
    }

    public static Camera AnyCamera(Random random)
    {
        var size = new PictureSize(random.Next(320, 4097), random.Next(240, 3073));
        var focal = Between(random, 0.6, 2) * Math.Max(size.Width, size.Height);
        var matrix = new CameraMatrix(
            focal,
            focal * Between(random, 0.98, 1.02),
            size.Width * Between(random, 0.45, 0.55),
            size.Height * Between(random, 0.45, 0.55));
        var rational = random.Next(3) == 0;
        return new(matrix, size, new(
            k1: Between(random, -0.25, 0.2),
            k2: Between(random, -0.05, 0.1),
            p1: Between(random, -2e-3, 2e-3),
            p2: Between(random, -2e-3, 2e-3),
            k3: Between(random, -0.02, 0.02),
            k4: rational ? Between(random, -0.1, 0.1) : 0,
            k5: rational ? Between(random, -0.02, 0.02) : 0,
            k6: rational ? Between(random, -0.005, 0.005) : 0));
    }

    public static double Between(Random random, double least, double most) => least + (most - least) * random.NextDouble();

    public static double Gauss(Random random) =>
        Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());

    // A pixel anywhere in the left picture and a depth from two to a hundred baselines; nothing where the right camera hardly sees any.
    private static Vector3D[]? TryPoints(Random random, Rig rig, int wanted)
    {
        var points = new List<Vector3D>();
        for (var attempt = 0; attempt < 20 * wanted && points.Count < wanted; attempt++)
        {
            var raw = new RawPixel(Between(random, 0, rig.Left.Size.Width - 1), Between(random, 0, rig.Left.Size.Height - 1));
            var depth = rig.BaselineMm * Math.Exp(Between(random, Math.Log(2), Math.Log(100)));
            if (rig.Left.TryUndistort(raw) is not { } ideal)
            {
                continue;
            }

            var point = depth * rig.Left.Matrix.Direction(ideal);
            var inRight = rig.Right.Project(rig.RightFromLeft.Transform(point));
            if (rig.Right.Size.Contains(inRight.U, inRight.V))
            {
                points.Add(point);
            }
        }

        return points.Count == wanted ? [.. points] : null;
    }
}
