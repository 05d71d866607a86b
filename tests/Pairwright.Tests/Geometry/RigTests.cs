using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class RigTests
{
    /// <summary>By hand: two cameras of half angle atan(0.4) (a 640 px picture at f = 800) whose borders cross at b / (2·0.4).</summary>
    [Fact]
    public void The_blind_zone_of_a_parallel_rig_ends_where_the_borders_cross()
    {
        var rig = Parallel();
        Assert.Equal(60 / 0.8, rig.BlindZoneMm!.Value, 0.01);
        Assert.True(rig.SharedViewAt(74).IsEmpty);
        Assert.False(rig.SharedViewAt(76).IsEmpty);
    }

    /// <summary>By hand: at depth Z each camera sees 0.8·Z by 0.6·Z, and they overlap in all but b of the width.</summary>
    [Fact]
    public void The_shared_view_of_a_parallel_rig_is_a_rectangle_narrower_by_the_baseline()
    {
        var view = Parallel().SharedViewAt(1000);
        Assert.Equal(740, view.WidthMm, 0.01);
        Assert.Equal(600, view.HeightMm, 0.01);
        Assert.InRange(view.AreaMm2 / (740 * 600), 0.9999, 1.0001);
        Assert.InRange(view.ShareOfLeft, 0.9249, 0.9251);
        Assert.All(view.Outline, point => Assert.Equal(1000, point.Z));
    }

    [Fact]
    public void Every_point_inside_the_shared_view_is_seen_by_both_cameras()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 91, count: 30, pointsPerRig: 3))
        {
            var blind = rig.BlindZoneMm;
            foreach (var point in points)
            {
                var view = rig.SharedViewAt(point.Z);
                Assert.False(view.IsEmpty);
                Assert.InRange(point.X, view.Outline.Min(p => p.X) - 0.01 * point.Z, view.Outline.Max(p => p.X) + 0.01 * point.Z);
                Assert.True(blind <= point.Z);

                // The border, drawn in by one part in two hundred towards a point that both see, is seen by both.
                foreach (var edge in view.Outline.Where((_, i) => i % 50 == 0))
                {
                    var inside = edge + 0.005 * (point - edge);
                    var (left, right) = (rig.Left.Project(inside), rig.Right.Project(rig.RightFromLeft.Transform(inside)));
                    Assert.True(Near(rig.Left.Size, left) && Near(rig.Right.Size, right), $"{left} {right}");
                }
            }
        }

        static bool Near(PictureSize size, RawPixel p) => p.U > -3 && p.V > -3 && p.U < size.Width + 2 && p.V < size.Height + 2;
    }

    [Fact]
    public void Cameras_that_look_apart_are_blind_everywhere()
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480));
        var rig = new Rig(camera, camera, Pose.FromVectors(new(0, -1.5, 0), new(-60, 0, 0)));
        Assert.Null(rig.BlindZoneMm);
        Assert.True(rig.SharedViewAt(1000).IsEmpty);
        Assert.Equal(0, rig.SharedViewAt(1000).AreaMm2);
        Assert.Throws<UserErrorException>(() => rig.SharedViewAt(0));
    }

    [Fact]
    public void Rays_of_an_exact_match_meet_in_the_point()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 92, count: 200))
        {
            foreach (var point in points)
            {
                var raw = Matches.RawOf(rig, point);
                Assert.InRange(rig.Ray(View.Left, raw.Left).DistanceTo(point) / point.Norm, 0, 1e-10);
                Assert.InRange(rig.Ray(View.Right, raw.Right).DistanceTo(point) / point.Norm, 0, 1e-10);
                var ray = rig.Ray(View.Right, raw.Right);
                Assert.InRange((ray.PointAt((point - ray.Origin).Norm) - point).Norm / point.Norm, 0, 1e-9);
            }
        }
    }

    [Fact]
    public void A_rotation_written_with_few_digits_becomes_the_nearest_rotation()
    {
        var exact = Rotation.FromVector(new(0.02, -0.1, 0.03));
        var rounded = Matrix3x3.From(exact.ToMatrix().Map(entry => Math.Round(entry, 7)));
        var rig = new Rig(Parallel().Left, Parallel().Right, new(rounded, new(-60, 1, 2)));
        var product = rig.RightFromLeft.Rotation * rig.RightFromLeft.Rotation.Transpose;
        Assert.InRange((product.ToMatrix() - Matrix<double>.Build.DenseIdentity(3)).FrobeniusNorm(), 0, 1e-14);
        Assert.InRange((rig.RightFromLeft.Rotation.ToMatrix() - exact.ToMatrix()).FrobeniusNorm(), 0, 3e-7);
    }

    [Fact]
    public void What_is_no_rotation_no_translation_or_no_covariance_is_refused()
    {
        var (left, right) = (Parallel().Left, Parallel().Right);
        Assert.Throws<UserErrorException>(() => new Rig(left, right, new(new(1, 0, 0, 0, 1, 0, 0, 0, 1.01), new(-60, 0, 0))));
        Assert.Throws<UserErrorException>(() => new Rig(left, right, new(new(1, 0, 0, 0, 1, 0, 0, 0, -1), new(-60, 0, 0))));
        Assert.Throws<UserErrorException>(() => new Rig(left, right, new(new(double.NaN, 0, 0, 0, 1, 0, 0, 0, 1), new(-60, 0, 0))));
        Assert.Throws<UserErrorException>(() => new Rig(left, right, new(Matrix3x3.Identity, default)));
        Assert.Throws<UserErrorException>(() => new Rig(left, right, new(Matrix3x3.Identity, new(double.NaN, 0, 0))));
        Assert.Throws<UserErrorException>(() => new Rig(left, right, Beside(), Matrix<double>.Build.DenseIdentity(29)));
        Assert.Throws<UserErrorException>(() => new Rig(left, right, Beside(), -1 * Matrix<double>.Build.DenseIdentity(30)));
        Assert.Throws<UserErrorException>(() => new Rig(left, right, Beside(), Matrix<double>.Build.Dense(30, 30, double.NaN)));

        // Every pair is possible, all three together are not: a with b, b with c, but a against c.
        var impossible = Matrix<double>.Build.DenseIdentity(30);
        (impossible[0, 1], impossible[1, 2], impossible[0, 2]) = (0.9, 0.9, -0.9);
        (impossible[1, 0], impossible[2, 1], impossible[2, 0]) = (0.9, 0.9, -0.9);
        Assert.Throws<UserErrorException>(() => new Rig(left, right, Beside(), impossible));
    }

    [Fact]
    public void Principal_changes_add_up_to_the_covariance()
    {
        var random = new Random(93);
        var root = Matrix<double>.Build.Dense(30, 30, (i, j) => j <= i && i is not (9 or 10 or 11) ? Math.Pow(10, -i % 7) * RandomRigs.Gauss(random) : 0);
        var covariance = root * root.Transpose();
        var rig = new Rig(Parallel().Left, Parallel().Right, Beside(), covariance);
        var sum = Matrix<double>.Build.Dense(30, 30);
        foreach (var change in rig.PrincipalChanges())
        {
            var vector = Vector<double>.Build.DenseOfEnumerable(change);
            sum += vector.OuterProduct(vector);
        }

        for (var i = 0; i < 30; i++)
        {
            for (var j = 0; j < 30; j++)
            {
                Assert.InRange(Math.Abs(sum[i, j] - covariance[i, j]), 0, 1e-9 * Math.Sqrt(covariance[i, i] * covariance[j, j]));
            }
        }

        Assert.Equal(0, rig.StandardUncertainty(9));
        Assert.True(double.IsNaN(Parallel().StandardUncertainty(0)));
        Assert.Empty(Parallel().PrincipalChanges());
    }

    [Fact]
    public void Values_tell_themselves()
    {
        var rig = RandomRigs.Any(new(94));
        object[] values =
        [
            rig, rig.Left, rig.Left.Matrix, rig.Left.Distortion, rig.RightFromLeft, rig.RightFromLeft.Rotation, rig.RightCentreInLeft,
            rig.FundamentalMatrix, rig.EssentialMatrix, rig.FundamentalMatrix.EpipoleInLeft, rig.Left.FieldOfView, rig.Ray(View.Left, new IdealPixel(3, 4)),
            rig.FundamentalMatrix.LineInRight(new(3, 4)), rig.SharedViewAt(1000), Rectification.Of(rig, RectificationFit.Everything).Geometry,
            Triangulation.Midpoint(rig, new IdealPixel(100, 100), new IdealPixel(90, 100)), new IdealMatch(new(1, 2), new(3, 4)),
        ];
        Assert.All(values, value => Assert.InRange(value.ToString()!.Length, 5, 2000));
    }

    private static Pose Beside() => new(Matrix3x3.Identity, new(-60, 0, 0));

    private static Rig Parallel()
    {
        var camera = new Camera(new(800, 800, 319.5, 239.5), new(640, 480));
        return new(camera, camera, Beside());
    }
}
