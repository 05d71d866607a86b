using Pairwright.Geometry;
using Pairwright.Measurement;
using Xunit;

namespace Pairwright.Tests.Measurement;

public class Planks_are_measured
{
    private const double Width = 180;
    private const double Length = 420;

    [Theory]
    [InlineData(0)]
    [InlineData(35)]
    [InlineData(-80)]
    public void Cup_bow_and_twist_of_an_exact_plank_are_those_it_was_made_with(double turnDegrees)
    {
        // h = cup·4u²/w² + bow·4v²/l² + twist·uv/(w·l), by definition of the sagitta and of the fourth corner.
        var points = Plank(cup: 1.3, bow: -2.1, twist: 0.9, turnDegrees);
        var fit = points.FitQuadratic(Across(turnDegrees));
        Assert.Equal(1.3, fit.SagittaAcross(Width).Value, 6);
        Assert.Equal(-2.1, fit.SagittaAlong(Length).Value, 6);

        // The distance is at right angles to a plane that bends away by a few millimetres in 180: less than the upright offset by a few parts in 10⁵.
        Assert.Equal(0.9, fit.FourthCorner(Width, Length).Value, 1e-4);
        Assert.Equal(1.3, points.Cup(Across(turnDegrees), Width).Value, 6);
        Assert.Equal(2.1, points.Bow(Across(turnDegrees), Length).Value, 6);
        Assert.Equal(0.9, points.Twist(Across(turnDegrees), Width, Length).Value, 1e-4);
    }

    [Fact]
    public void The_twist_is_the_distance_of_the_fourth_corner_from_the_plane_of_the_other_three()
    {
        // Against the four corners themselves, with vectors alone.
        var corners = new[] { (-1, -1), (1, -1), (-1, 1), (1, 1) }
            .Select(s => Place(s.Item1 * Width / 2, s.Item2 * Length / 2, Height(0, 0, 3, s.Item1 * Width / 2, s.Item2 * Length / 2), 20)).ToArray();
        var normal = (corners[1] - corners[0]).Cross(corners[2] - corners[0]).Normalized;
        var distance = Math.Abs(normal.Dot(corners[3] - corners[0]));
        Assert.Equal(distance, Plank(0, 0, 3, 20).Twist(Across(20), Width, Length).Value, 6);
    }

    [Fact]
    public void The_edges_nearer_to_the_camera_than_the_middle_make_a_cup_above_zero()
    {
        Assert.True(Plank(1, 0, 0, 10).FitQuadratic(Across(10)).SagittaAcross(Width).Value > 0);
        Assert.True(Plank(-1, 0, 0, 10).FitQuadratic(Across(10)).SagittaAcross(Width).Value < 0);
        Assert.Equal(1, Plank(-1, 0, 0, 10).Cup(Across(10), Width).Value, 6);
    }

    [Fact]
    public void A_plank_finds_its_own_short_side_and_extent()
    {
        var points = Plank(1.3, 0, 0, 35);
        Assert.Equal(Width, points.FitQuadratic().Width.Value, 0.1);
        Assert.Equal(Length, points.FitQuadratic().Length.Value, 0.1);
        Assert.Equal(1.3, points.Cup().Value, 2e-3);
        var square = Plank(1.3, 0, 0, 35, length: Width);
        Assert.Contains("across the grain", Assert.Throws<UserErrorException>(() => square.Cup()).Message);
    }

    [Fact]
    public void A_missing_corner_does_not_make_a_cupped_plank_twisted()
    {
        // Principal axes would turn by a degree here, and a cup of 3 mm seen askew would pass for 0.9 mm of twist.
        var whole = Plank(3, 0, 0, 10);
        var middle = whole.Centroid;
        var (across, along) = (Across(10), new Vector3D(0.05, -0.08, -1).Normalized.Cross(Across(10)));
        var cut = whole.Where(p => across.Dot(p - middle) < 0.25 * Width || along.Dot(p - middle) < 0.25 * Length);
        Assert.InRange(cut.Count, 0.9 * whole.Count, 0.97 * whole.Count);
        var twist = cut.FitQuadratic().FourthCorner(Width, Length);
        Assert.Equal(0, twist.Value, 0.06);
        Assert.Equal(3, cut.FitQuadratic().SagittaAcross(Width).Value, 0.01);
        Assert.True(Math.Abs(twist.Value) < 2 * twist.RandomSigma + 0.02);
    }

    [Fact]
    public void A_direction_that_was_found_is_part_of_the_uncertainty_and_one_that_was_given_is_not()
    {
        // 100 × 40 pixels of 1000/600 mm with a cup of 5 mm: askew by φ it seems twisted by 8·cup·(l/w)·φ = 100 mm·φ, and edges that are known to
        // half a pixel give φ to a few parts in 10⁴.
        var map = NoisySurface.Of(120, 60, (_, y) => 1000 - 5 * 4 * y * y / (66.7 * 66.7), 0.002, new Random(5));
        var points = map.Within(new Pairwright.Imaging.PixelRegion(10, 10, 100, 40));
        var given = points.FitQuadratic(new Vector3D(0, 1, 0)).FourthCorner().RandomSigma;
        var found = points.FitQuadratic().FourthCorner().RandomSigma;
        Assert.InRange(Math.Sqrt(found * found - given * given), 0.02, 0.15);
    }

    [Fact]
    public void The_width_of_a_dense_region_is_known_to_a_pixel()
    {
        var random = new Random(4);
        var map = NoisySurface.Of(80, 60, (_, _) => 1000, 0.02, random);
        var fit = map.Within(new Pairwright.Imaging.PixelRegion(10, 20, 60, 24)).FitQuadratic(new Vector3D(0, 1, 0));

        // 24 and 60 pixels of 1000/600 mm each.
        Assert.Equal(40, fit.Width.Value, 3 * fit.Width.StandardUncertainty);
        Assert.Equal(100, fit.Length.Value, 3 * fit.Length.StandardUncertainty);
        Assert.Equal(1000.0 / 600 / Math.Sqrt(6), fit.Width.RandomSigma, 2);
    }

    [Fact]
    public void The_form_of_a_twisted_surface_has_the_flatness_of_calculus()
    {
        // h = t·uv/(w·l) over the rectangle: peak to valley t/2, RMS t/12 (mean of u²v² is w²l²/144).
        var flatness = Plank(0, 0, 1.2, 0).FitQuadratic(Across(0)).Flatness();
        Assert.Equal(0.6, flatness.PeakToValley.Value, 0.01);
        Assert.Equal(0.1, flatness.Rms.Value, 0.011);
    }

    [Fact]
    public void Board_corners_are_as_flat_as_their_noise()
    {
        // RMS of 108 heights with three parameters fitted, against the σ along the normal: 4 σ of an RMS of 105 readings is 28 %.
        var rig = TestRig.Of(covariance: TestRig.Exact);
        var random = new Random(8);
        var (lefts, rights) = TestRig.Seen(rig, TestRig.Grid(new(0, 0, 900), new(1, 0, 0), new(0, 1, 0), 200, 150));
        RawPixel Noisy(RawPixel pixel) => new(pixel.U + 0.1 * TestRig.Gauss(random), pixel.V + 0.1 * TestRig.Gauss(random));
        var points = MeasuredPoints.FromCorners(rig, Array.ConvertAll(lefts, Noisy), Array.ConvertAll(rights, Noisy), 0.1);
        var flatness = points.Flatness();
        var expected = points[54].Z.RandomSigma * Math.Sqrt(105.0 / 108);
        Assert.Equal(1, flatness.Rms.Value / expected, 0.28);
        Assert.InRange(flatness.PeakToValley.Value / expected, 3, 8);
        Assert.True(flatness.PeakToValley.RandomSigma > expected);
    }

    [Fact]
    public void A_width_that_is_none_is_refused()
    {
        Assert.Throws<UserErrorException>(() => Plank(1, 0, 0, 0).Cup(Across(0), widthMm: 0));
        Assert.Throws<UserErrorException>(() => Plank(1, 0, 0, 0).Cup(new Vector3D(0.05, -0.08, -1), widthMm: 100));
    }

    private static MeasuredPoints Plank(double cup, double bow, double twist, double turnDegrees, double length = Length)
    {
        var rig = TestRig.Of(width: 1280, height: 960, focal: 1100, covariance: TestRig.Exact);
        var points =
            from j in Enumerable.Range(-30, 61)
            from i in Enumerable.Range(-13, 27)
            let u = i * Width / 26
            let v = j * length / 60
            select Place(u, v, Height(cup, bow, twist, u, v), turnDegrees);
        var (lefts, rights) = TestRig.Seen(rig, points);
        return MeasuredPoints.FromCorners(rig, lefts, rights, 0);
    }

    private static double Height(double cup, double bow, double twist, double u, double v) =>
        cup * 4 * u * u / (Width * Width) + bow * 4 * v * v / (Length * Length) + twist * u * v / (Width * Length);

    // The plank lies across the view at 1.1 m, tilted a little, turned about its normal; v = normal × u as in the fit.
    private static Vector3D Place(double u, double v, double h, double turnDegrees)
    {
        var normal = new Vector3D(0.05, -0.08, -1).Normalized;
        return new Vector3D(30, 20, 1100) + u * Across(turnDegrees) + v * normal.Cross(Across(turnDegrees)) + h * normal;
    }

    private static Vector3D Across(double turnDegrees)
    {
        var normal = new Vector3D(0.05, -0.08, -1).Normalized;
        var right = new Vector3D(1, 0, 0.05).Normalized;
        var turn = turnDegrees * Math.PI / 180;
        return Math.Cos(turn) * right + Math.Sin(turn) * normal.Cross(right);
    }
}
