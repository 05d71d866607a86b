using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class FundamentalMatrixTests
{
    [Fact]
    public void Exact_matches_fulfil_the_epipolar_equation_to_1e_12()
    {
        var worst = 0.0;
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 31))
        {
            foreach (var match in points.Select(point => Matches.Of(rig, point)))
            {
                var f = rig.FundamentalMatrix;
                worst = Math.Max(worst, Math.Abs(f.AlgebraicResidual(match.Left, match.Right)));
                Assert.InRange(Math.Abs(f.SampsonDistance(match.Left, match.Right)), 0, 1e-9);
                Assert.InRange(Math.Abs(f.EpipolarDistance(match.Left, match.Right, View.Left)), 0, 1e-9);
                Assert.InRange(Math.Abs(f.EpipolarDistance(match.Left, match.Right)), 0, 1e-9);
                Assert.InRange(f.SymmetricDistance(match.Left, match.Right), 0, 1e-9);
            }
        }

        Assert.InRange(worst, 0, 1e-12);
    }

    /// <summary>Reference: the closed form for pure translation and one camera matrix of unit focal length, F ~ [t]× (Hartley and Zisserman 2003, 9.3.1).</summary>
    [Fact]
    public void For_pure_translation_it_is_the_skew_matrix_of_the_translation()
    {
        var camera = new Camera(new(1, 1, 0, 0), new(2, 2));
        var random = new Random(32);
        for (var i = 0; i < 1000; i++)
        {
            var t = new Vector3D(RandomRigs.Gauss(random), RandomRigs.Gauss(random), RandomRigs.Gauss(random));
            var f = new Rig(camera, camera, new(Matrix3x3.Identity, t)).FundamentalMatrix.Matrix;
            var expected = (1 / Matrix3x3.Skew(t).FrobeniusNorm) * Matrix3x3.Skew(t);
            Assert.InRange(Math.Min(Apart(f, expected), Apart(f, -1 * expected)), 0, 1e-15);
        }
    }

    /// <summary>Reference: for pure translation and one camera matrix K, F ~ [K·t]×, whatever K is (Hartley and Zisserman 2003, 9.3.1).</summary>
    [Fact]
    public void For_pure_translation_it_is_the_skew_matrix_of_the_epipole()
    {
        var camera = new Camera(new(800, 810, 320, 240), new(640, 480));
        var t = new Vector3D(-60, 3, 7);
        var f = new Rig(camera, camera, new(Matrix3x3.Identity, t)).FundamentalMatrix.Matrix;
        var skew = Matrix3x3.Skew(camera.Matrix.Matrix * t);
        var expected = (1 / skew.FrobeniusNorm) * skew;
        Assert.InRange(Math.Min(Apart(f, expected), Apart(f, -1 * expected)), 0, 1e-15);
    }

    [Fact]
    public void It_has_norm_one_rank_two_and_a_positive_largest_entry()
    {
        foreach (var (rig, _) in RandomRigs.WithPoints(seed: 33, count: 200, pointsPerRig: 1))
        {
            var f = rig.FundamentalMatrix;
            Assert.Equal(1, f.Matrix.FrobeniusNorm, 14);
            Assert.True(Entries(f.Matrix).MaxBy(Math.Abs) > 0);
            Assert.Equal(2, f.Rank);
            Assert.Equal(0, f.RankTwoDeviation);
            Assert.Equal(1, f.SingularValues.Sum(value => value * value), 12);
        }
    }

    [Fact]
    public void Epipoles_are_the_pictures_of_the_other_cameras_centre()
    {
        foreach (var (rig, _) in RandomRigs.WithPoints(seed: 34, count: 500, pointsPerRig: 1))
        {
            var f = rig.FundamentalMatrix;
            Assert.InRange((f.Matrix * f.EpipoleInLeft.Homogeneous).Norm, 0, 1e-14);
            Assert.InRange((f.Matrix.Transpose * f.EpipoleInRight.Homogeneous).Norm, 0, 1e-14);
            var centre = rig.RightCentreInLeft;
            var seen = rig.Left.ProjectIdeal(centre.Z > 0 ? centre : -centre);
            Assert.InRange(Math.Abs(f.EpipoleInLeft.Pixel!.Value.U / seen.U - 1), 0, 1e-9);

            // The same from the matrix alone, as for one that was given.
            var given = FundamentalMatrix.From(f.Matrix);
            Assert.InRange(Math.Abs(given.EpipoleInLeft.Homogeneous.Dot(f.EpipoleInLeft.Homogeneous)), 1 - 1e-9, 1 + 1e-9);
            Assert.InRange(Math.Abs(given.EpipoleInRight.Homogeneous.Dot(f.EpipoleInRight.Homogeneous)), 1 - 1e-9, 1 + 1e-9);
        }
    }

    [Fact]
    public void Epipoles_of_a_parallel_rig_lie_at_infinity_along_the_rows()
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480));
        var f = new Rig(camera, camera, new(Matrix3x3.Identity, new(-60, 0, 0))).FundamentalMatrix;
        foreach (var epipole in new[] { f.EpipoleInLeft, f.EpipoleInRight })
        {
            Assert.False(epipole.IsFinite);
            Assert.Null(epipole.Pixel);
            Assert.Equal(1, Math.Abs(epipole.Direction.U), 12);
            Assert.Contains("infinity", epipole.ToString());
        }
    }

    [Fact]
    public void All_lines_pass_through_the_epipole()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 35, count: 200))
        {
            var f = rig.FundamentalMatrix;
            var (left, right) = (f.EpipoleInLeft.Homogeneous, f.EpipoleInRight.Homogeneous);
            foreach (var match in points.Select(point => Matches.Of(rig, point)))
            {
                var (inRight, inLeft) = (f.LineInRight(match.Left), f.LineInLeft(match.Right));
                Assert.InRange(Math.Abs(new Vector3D(inRight.A, inRight.B, inRight.C).Dot(right)), 0, 1e-9 * (1 + Math.Abs(inRight.C)));
                Assert.InRange(Math.Abs(new Vector3D(inLeft.A, inLeft.B, inLeft.C).Dot(left)), 0, 1e-9 * (1 + Math.Abs(inLeft.C)));
            }
        }
    }

    [Fact]
    public void The_line_of_the_epipole_itself_is_refused()
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480));
        var f = new Rig(camera, camera, new(Matrix3x3.Identity, new(0, 0, -100))).FundamentalMatrix;
        var error = Assert.Throws<UserErrorException>(() => f.LineInRight(new(320, 240)));
        Assert.Contains("epipole", error.Message);
    }

    [Fact]
    public void A_given_matrix_of_rank_three_becomes_the_nearest_of_rank_two_and_says_how_far_it_was()
    {
        var given = new Matrix3x3(3, 0, 0, 0, 2, 0, 0, 0, 1);
        var f = FundamentalMatrix.From(given);
        Assert.Equal(2, f.Rank);
        Assert.Equal(0.5, f.RankTwoDeviation, 12);
        Assert.Equal(1.5, f.Matrix.M11 / f.Matrix.M22, 12);
        Assert.Equal(0, f.Matrix.M33, 12);
    }

    [Fact]
    public void A_given_matrix_of_any_scale_is_the_same()
    {
        var f = RandomRigs.Any(new(36)).FundamentalMatrix;
        Assert.InRange(Apart(f.Matrix, FundamentalMatrix.From(-1e-9 * f.Matrix).Matrix), 0, 1e-15);
    }

    [Fact]
    public void A_given_matrix_of_rank_one_or_with_no_number_is_refused()
    {
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.From(new(1, 1, 1, 1, 1, 1, 1, 1, 1)));
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.From(default));
        Assert.Throws<UserErrorException>(() => FundamentalMatrix.From(new(double.NaN, 1, 1, 1, 1, 1, 1, 1, 1)));
    }

    /// <summary>By hand: rows 3 px apart in a parallel rig; the four coordinates share the blame, so that Sampson's distance is 3/√2.</summary>
    [Fact]
    public void Residuals_of_a_parallel_rig_are_row_differences()
    {
        var camera = new Camera(new(800, 800, 320, 240), new(640, 480));
        var f = new Rig(camera, camera, new(Matrix3x3.Identity, new(-60, 0, 0))).FundamentalMatrix;
        var (left, right) = (new IdealPixel(400, 200), new IdealPixel(380, 203));
        Assert.Equal(3, Math.Abs(f.EpipolarDistance(left, right)), 12);
        Assert.Equal(3, Math.Abs(f.EpipolarDistance(left, right, View.Left)), 12);
        Assert.Equal(3, f.SymmetricDistance(left, right), 12);
        Assert.Equal(3 / Math.Sqrt(2), Math.Abs(f.SampsonDistance(left, right)), 12);
    }

    private static double[] Entries(Matrix3x3 m) => [m.M11, m.M12, m.M13, m.M21, m.M22, m.M23, m.M31, m.M32, m.M33];

    private static double Apart(Matrix3x3 a, Matrix3x3 b) => Entries(a).Zip(Entries(b), (x, y) => Math.Abs(x - y)).Max();
}
