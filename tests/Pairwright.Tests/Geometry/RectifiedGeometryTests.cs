using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class RectifiedGeometryTests
{
    /// <summary>
    /// Source: Middlebury 2014, data set Motorcycle, and its published formula Z = b·f/(d + offset) (Scharstein et al. 2014). The figures
    /// f 3997.684 px, baseline 193.001 mm, offset 131.111 px are typed from memory of the published calibration file; the depths are
    /// worked out from them with a pocket calculator.
    /// </summary>
    [Theory]
    [InlineData(0, 5884.762)]
    [InlineData(23, 5006.502)]
    [InlineData(256, 1993.116)]
    public void Depth_follows_the_published_formula_for_the_Motorcycle_figures(double disparity, double depthMm)
    {
        var geometry = new RectifiedGeometry(3997.684, 193.001, 131.111, 1176.728, 1011.728, new(2964, 1988));
        Assert.Equal(depthMm, geometry.DepthMm(disparity), 0.001);
        Assert.Equal(disparity, geometry.Disparity(depthMm), 1e-3);
    }

    [Fact]
    public void Depth_and_disparity_undo_each_other()
    {
        var geometry = new RectifiedGeometry(1000, 100, -20, 320, 240, new(640, 480));
        foreach (var depth in new[] { 200.0, 1000, 99_999 })
        {
            Assert.Equal(depth, geometry.DepthMm(geometry.Disparity(depth)), 1e-6);
        }
    }

    [Fact]
    public void A_disparity_at_or_behind_infinity_has_no_depth()
    {
        var geometry = new RectifiedGeometry(1000, 100, -20, 320, 240, new(640, 480));
        Assert.True(double.IsNaN(geometry.DepthMm(20)));
        Assert.True(double.IsNaN(geometry.DepthMm(19)));
        Assert.True(double.IsNaN(geometry.DepthMm(double.NaN)));
        Assert.True(double.IsNaN(geometry.PointInLeftCamera(new(1, 1), 20).Z));
    }

    /// <summary>Reference: the difference quotient of depth over disparity.</summary>
    [Fact]
    public void The_slope_of_depth_is_its_difference_quotient()
    {
        var geometry = new RectifiedGeometry(1000, 100, 5, 320, 240, new(640, 480));
        var slope = (geometry.DepthMm(50.001) - geometry.DepthMm(49.999)) / 0.002;
        Assert.Equal(slope, geometry.DepthPerDisparity(geometry.DepthMm(50)), 1e-5);
    }

    [Theory]
    [InlineData(0, 100, 0)]
    [InlineData(1000, -1, 0)]
    [InlineData(1000, 100, double.NaN)]
    [InlineData(double.NaN, 100, 0)]
    public void Figures_out_of_range_are_refused(double focal, double baseline, double offset) =>
        Assert.Throws<UserErrorException>(() => new RectifiedGeometry(focal, baseline, offset, 320, 240, new(640, 480)));

    [Fact]
    public void A_turn_that_is_no_rotation_is_refused() =>
        Assert.Throws<UserErrorException>(() => new RectifiedGeometry(1000, 100, 0, 320, 240, new(640, 480), new(2, 0, 0, 0, 1, 0, 0, 0, 1)));
}
