using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Measurement;
using Xunit;

namespace Pairwright.Tests.Measurement;

public class Depth_comes_from_disparity
{
    private static readonly PictureSize Size = new(24, 16);

    [Fact]
    public void A_depth_is_focal_length_times_baseline_over_disparity_plus_offset()
    {
        // f, b and offset of the Middlebury 2014 pair Motorcycle at full size, typed from memory of its calibration file; Z by its published formula.
        var depth = Map(new(3997.684, 193.001, 131.111, 12, 8, Size), (u, _) => 20f + 10 * u).ToDepth();
        Assert.Equal(193.001 * 3997.684 / (20 + 131.111), depth[0, 3].Value, 1e-6);
        Assert.Equal(193.001 * 3997.684 / (130 + 131.111), depth.Z[11, 9], 1e-3);
    }

    [Fact]
    public void A_pixel_without_a_match_has_no_depth()
    {
        var depth = Map(Geometry(), (u, v) => u == 3 && v == 2 ? float.NaN : 40).ToDepth();
        Assert.True(float.IsNaN(depth.Z[3, 2]));
        Assert.Equal(1 - 1.0 / Size.Area, depth.Z.ValidShare, 9);
        Assert.Contains("(3, 2)", Assert.Throws<UserErrorException>(() => depth.PointAt(3, 2)).Message);
    }

    [Fact]
    public void A_filled_pixel_was_not_measured_and_has_no_depth()
    {
        // A plain picture has no match anywhere, so everything is filled.
        var plain = new Picture(Size, new ushort[Size.Area], 8);
        var map = new RectifiedPair(plain, plain, Geometry()).Match(Recipe.For(new DisparityRange(0, 8)) with { Filters = [new FillAll()] });
        Assert.Equal(1, map.Disparity.ValidShare);
        Assert.Equal(0, map.ToDepth().Z.ValidShare);
    }

    [Fact]
    public void A_depths_sigma_is_the_spread_of_depths_from_disparities_with_that_sigma()
    {
        // Against random trials (JCGM 101): 20,000 give a standard deviation to 0.5 %, 2 % is four of those; second order adds 10⁻⁴.
        var geometry = Geometry();
        var depth = Map(geometry, (_, _) => 40, sigma: 0.3f).ToDepth();
        var trials = MonteCarlo.Propagate(draw => geometry.DepthMm(draw.Normal(40, 0.3)), 20_000);
        Assert.Equal(1, depth[5, 5].RandomSigma / trials.StandardUncertainty, 0.02);
        Assert.Equal(depth[5, 5].RandomSigma, depth.Sigma![5, 5], 1e-3);
    }

    [Fact]
    public void Without_a_sigma_of_disparity_or_a_rig_the_uncertainty_of_a_depth_is_not_known()
    {
        var depth = Map(Geometry(), (_, _) => 40).ToDepth();
        Assert.Null(depth.Sigma);
        Assert.True(double.IsNaN(depth[5, 5].RandomSigma));
        Assert.True(double.IsNaN(depth[5, 5].CommonSigma));
    }

    [Fact]
    public void The_rig_of_the_pair_and_the_reach_of_the_matcher_stay_with_the_depth()
    {
        var rig = TestRig.Of();
        var rectification = Rectification.Of(rig);
        var size = rectification.Geometry.Size;
        var picture = new Picture(size, new ushort[size.Area], 8);
        var map = DisparityMap.FromValues(
            new(picture, picture, rectification: rectification), ScalarMap.From(size, (_, _) => (float)rectification.Geometry.Disparity(1000)), "a flat wall");
        var depth = map.ToDepth();
        Assert.Same(rig, depth.Rig);
        Assert.Equal(map.CorrelationLengthPx, depth.CorrelationLengthPx);
        Assert.True(depth[100, 100].CommonSigma > 0);
    }

    [Fact]
    public void A_pair_of_unknown_geometry_gives_disparity_but_no_depth()
    {
        var picture = new Picture(Size, new ushort[Size.Area], 8);
        var map = DisparityMap.FromValues(new(picture, picture), ScalarMap.From(Size, (_, _) => 4), "a flat wall");
        Assert.Contains("baseline", Assert.Throws<UserErrorException>(() => map.ToDepth()).Message);
    }

    private static RectifiedGeometry Geometry() => new(600, 200, 0, 12, 8, Size);

    private static DisparityMap Map(RectifiedGeometry geometry, Func<int, int, float> disparity, float? sigma = null)
    {
        var picture = new Picture(Size, new ushort[Size.Area], 8);
        var map = DisparityMap.FromValues(new(picture, picture, geometry), ScalarMap.From(Size, disparity), "by hand");
        return sigma is { } known ? map.WithSigma(ScalarMap.From(Size, (_, _) => known)) : map;
    }

    private sealed class FillAll : Filter
    {
        public override string Name => "fill all";

        public override void Apply(WorkingMap map, CancellationToken stop)
        {
            map.Disparity.Fill(4);
            map.Labels.Fill(DisparityLabel.Filled);
        }
    }
}
