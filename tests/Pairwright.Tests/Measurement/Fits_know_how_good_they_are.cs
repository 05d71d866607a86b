using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Measurement;
using Xunit;

namespace Pairwright.Tests.Measurement;

public class Fits_know_how_good_they_are
{
    private const int Trials = 250;

    [Fact]
    public void A_plane_through_exact_points_is_that_plane()
    {
        var normal = new Vector3D(0.1, -0.2, -1).Normalized;
        var u = new Vector3D(1, 0, 0.1).Normalized;
        var (lefts, rights) = TestRig.Seen(TestRig.Of(), TestRig.Grid(new(10, 5, 900), u, normal.Cross(u), 200, 100));
        var fit = MeasuredPoints.FromCorners(TestRig.Of(), lefts, rights, 0).FitPlane();
        Assert.True((fit.Normal - normal.Cross(u).Cross(u).Normalized).Norm < 1e-10 || (fit.Normal + normal.Cross(u).Cross(u).Normalized).Norm < 1e-10);
        Assert.True((fit.Centroid - new Vector3D(10, 5, 900)).Norm < 1e-7);
        Assert.Equal(0, fit.RmsMm, 7);
        Assert.Equal(0, fit.OutlierShare);
        Assert.True(fit.Normal.Z < 0, "the normal looks towards the camera");
    }

    [Fact]
    public void A_plane_is_the_total_least_squares_plane_of_the_singular_value_decomposition()
    {
        // Reference: MathNet's SVD of the centred points, on noise too small and too even for any point to lose its say.
        var random = new Random(3);
        var truth = TestRig.Grid(new(0, 0, 1000), new(1, 0, 0), new(0, 1, 0), 100, 80).Select(p => p + new Vector3D(0, 0, 0.2 * (random.Next(2) - 0.5))).ToArray();
        var rig = TestRig.Of();
        var (lefts, rights) = TestRig.Seen(rig, truth);
        var fit = MeasuredPoints.FromCorners(rig, lefts, rights, 0).FitPlane();
        var mean = truth.Aggregate(default(Vector3D), (sum, p) => sum + p) / truth.Length;
        var centred = MathNet.Numerics.LinearAlgebra.Matrix<double>.Build.Dense(truth.Length, 3, (i, j) => j switch
        {
            0 => truth[i].X - mean.X,
            1 => truth[i].Y - mean.Y,
            _ => truth[i].Z - mean.Z,
        });
        var least = centred.Svd().VT.Row(2);
        Assert.Equal(1, Math.Abs(least[0] * fit.Normal.X + least[1] * fit.Normal.Y + least[2] * fit.Normal.Z), 6);
    }

    [Fact]
    public void The_true_height_of_a_step_lies_within_two_sigma_in_95_of_100_maps_although_neighbours_share_their_noise()
    {
        // 250 maps: 3 σ of a share of 0.95 is 0.041.
        var random = new Random(21);
        var pulls = Enumerable.Range(0, Trials).Select(_ =>
        {
            var map = NoisySurface.Of(70, 60, (x, y) => x < 0 ? 1100 + 0.05 * y : 1060 + 0.05 * y, 0.2, random);
            var step = map.Within(new PixelRegion(37, 2, 30, 56)).FitPlane().StepHeightOver(map.Within(new PixelRegion(2, 2, 30, 56)).FitPlane());
            return (step.Value - 40 / Math.Sqrt(1 + 0.05 * 0.05)) / step.RandomSigma;
        }).ToArray();
        AssertCovers(pulls);
    }

    [Fact]
    public void The_true_sagitta_and_twist_lie_within_two_sigma_in_95_of_100_maps()
    {
        var random = new Random(22);
        var (cups, twists) = (new List<double>(), new List<double>());
        for (var trial = 0; trial < Trials; trial++)
        {
            // h = −(Z − 1000): cup of 2 mm over 80 mm, twist of 4 mm over 80 mm × 100 mm.
            var map = NoisySurface.Of(56, 70, (x, y) => 1000 - 2 * 4 * x * x / (80.0 * 80) - 4 * x * y / (80.0 * 100), 0.2, random);
            var fit = map.Within(new PixelRegion(4, 4, 48, 62)).FitQuadratic(new Vector3D(1, 0, 0));
            var (cup, twist) = (fit.SagittaAcross(80), fit.FourthCorner(80, 100));
            cups.Add((cup.Value - 2) / cup.RandomSigma);

            // With u to the right and v = normal × u, which points up, a surface that rises with +x, +y twists by −4 mm.
            twists.Add((twist.Value + 4) / twist.RandomSigma);
        }

        AssertCovers([.. cups]);
        AssertCovers([.. twists]);
    }

    [Fact]
    public void Taking_neighbours_as_independent_would_promise_far_too_much()
    {
        // The naive standard uncertainty of a mean, σ/√n, against the one stated: windows of 7 × 7 pixels share their noise.
        var map = NoisySurface.Of(70, 60, (_, _) => 1000, 0.2, new(5));
        var points = map.Within(new PixelRegion(5, 5, 60, 50));
        var naive = map[30, 30].RandomSigma / Math.Sqrt(points.Count);
        var stated = points.FitPlane().CentroidDepth.RandomSigma;
        Assert.InRange(stated / naive, 4, 11);
    }

    [Fact]
    public void Wrong_matches_have_no_say()
    {
        var clean = NoisySurface.Of(70, 60, (_, _) => 1000, 0.1, new(6)).Within(new PixelRegion(5, 5, 60, 50)).FitPlane();
        var spoilt = NoisySurface.Of(70, 60, (_, _) => 1000, 0.1, new(6), wrongShare: 0.15).Within(new PixelRegion(5, 5, 60, 50)).FitPlane();
        Assert.Equal(1000, spoilt.CentroidDepth.Value, 3 * clean.CentroidDepth.RandomSigma);
        Assert.InRange(spoilt.OutlierShare, 0.12, 0.17);
    }

    [Fact]
    public void A_region_of_few_blocks_falls_back_on_the_stated_sigma_and_says_so()
    {
        var region = new PixelRegion(20, 20, 16, 16);
        var stated = NoisySurface.Of(70, 60, (_, _) => 1000, 0.1, new(6)).Within(region).FitPlane();
        Assert.Contains("stated σ", stated.RandomPartBasis);
        Assert.True(stated.CentroidDepth.RandomSigma > 0);
        var unknown = NoisySurface.Of(70, 60, (_, _) => 1000, 0.1, new(6), stateSigma: false).Within(region).FitPlane();
        Assert.True(double.IsNaN(unknown.CentroidDepth.RandomSigma));
        Assert.Equal(VerdictOutcome.Undecided, Requirement.AtLeast("depth", 900.Millimetres()).Judge(unknown.CentroidDepth).Outcome);
    }

    [Fact]
    public void The_angle_between_planes_is_the_one_they_were_made_with()
    {
        var rig = TestRig.Of();
        PlaneFit Tilted(double degrees)
        {
            var u = new Vector3D(Math.Cos(degrees * Math.PI / 180), 0, Math.Sin(degrees * Math.PI / 180));
            var (lefts, rights) = TestRig.Seen(rig, TestRig.Grid(new(0, 0, 1000), u, new(0, 1, 0), 200, 150));
            return MeasuredPoints.FromCorners(rig, lefts, rights, 0.1).FitPlane();
        }

        Assert.Equal(12.5, Tilted(20).AngleTo(Tilted(7.5)).Value, 6);
        Assert.Equal(20, Tilted(20).Tilt.Value, 6);
        Assert.True(Tilted(20).AngleTo(Tilted(7.5)).RandomSigma < 1e-6, "exact corners scatter by nothing");
    }

    [Fact]
    public void Too_few_points_and_points_on_a_line_are_refused_in_one_sentence()
    {
        var rig = TestRig.Of();
        var (lefts, rights) = TestRig.Seen(rig, TestRig.Grid(new(0, 0, 1000), new(1, 0, 0), new(0, 1, 0), 200, 0));
        Assert.Contains("line", Assert.Throws<UserErrorException>(() => MeasuredPoints.FromCorners(rig, lefts, rights, 0.1).FitPlane()).Message);
        Assert.Contains("three", Assert.Throws<UserErrorException>(() => MeasuredPoints.FromCorners(rig, lefts[..2], rights[..2], 0.1).FitPlane()).Message);
        Assert.Throws<UserErrorException>(() => MeasuredPoints.FromCorners(rig, lefts, rights[..2], 0.1));
    }

    private static void AssertCovers(double[] pulls)
    {
        var covered = pulls.Count(pull => Math.Abs(pull) <= 2) / (double)pulls.Length;
        var spread = Math.Sqrt(pulls.Average(pull => pull * pull));
        Assert.True(covered is > 0.91 and <= 0.992, $"{covered:P1} within 2 σ, pulls of {spread:F2} σ");
    }

    [Theory]
    [InlineData(0, 0.9, 1.1)]
    [InlineData(0.4, 0, 1.2)]
    public void A_pull_towards_whole_pixels_that_no_scatter_shows_is_part_of_the_uncertainty(double slope, double least, double most)
    {
        // A matcher's error σ·√2·cos(2πd + φ) with a phase that nobody knows, in steps all around: the spread of the fitted planes is their σ.
        // On a plane that faces the cameras all of it is there and the scatter shows nothing; on a slanted one most of it averages out.
        const double sigma = 0.02;
        const int phases = 24;
        var geometry = NoisySurface.Geometry(90, 70);
        var (errors, stated) = (new List<double>(), new List<double>());
        for (var k = 0; k < phases; k++)
        {
            var phase = 2 * Math.PI * (k + 0.3) / phases;
            var disparity = ScalarMap.From(geometry.Size, (u, v) =>
            {
                var d = geometry.Disparity(1003) + slope * (u - 45) / 10;
                return (float)(d + sigma * Math.Sqrt(2) * Math.Cos(2 * Math.PI * d + phase));
            });
            var camera = new Camera(new(600, 600, 45, 35), geometry.Size);
            var rig = new Rig(camera, camera, new(Matrix3x3.Identity, new(-200, 0, 0)), TestRig.Exact);
            var depth = new DepthMap(disparity, geometry, new Rectification(rig, geometry), ScalarMap.From(geometry.Size, (_, _) => 0.001f), 7, pullSigmaPx: sigma);
            var middle = depth.Within(new PixelRegion(5, 5, 80, 60)).FitPlane().CentroidDepth;
            errors.Add(middle.Value);
            stated.Add(middle.RandomSigma);
        }

        var mean = errors.Average();
        Assert.InRange(Math.Sqrt(errors.Average(value => Math.Pow(value - mean, 2))) / Math.Sqrt(stated.Average(value => value * value)), least, most);
        Assert.True(slope == 0 || stated.Average() < 0.3 * sigma * 1003 * 1003 / (geometry.FocalPixels * geometry.BaselineMm));
    }
}
