using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class EpipolarLineTests
{
    /// <summary>Reference: OpenCV's computeCorrespondEpilines on the same matrix, on 1,000 random rigs.</summary>
    [Fact]
    public void Lines_agree_with_OpenCV_on_the_same_matrix_to_1e_5()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 41))
        {
            var matches = Array.ConvertAll(points, point => Matches.Of(rig, point));
            var f = rig.FundamentalMatrix;
            foreach (var view in Enum.GetValues<View>())
            {
                var pixels = Array.ConvertAll(matches, match => view == View.Left ? match.Left : match.Right);
                var expected = ReferenceOpenCv.Lines(f.Matrix, pixels, of: view);
                for (var i = 0; i < pixels.Length; i++)
                {
                    var line = f.LineOf(view, pixels[i]);
                    Assert.Equal(view.Other(), line.View);
                    var sign = Math.Sign(line.A * expected[i].X + line.B * expected[i].Y);
                    Assert.InRange(Math.Abs(line.A - sign * expected[i].X), 0, 1e-5);
                    Assert.InRange(Math.Abs(line.B - sign * expected[i].Y), 0, 1e-5);
                    Assert.InRange(Math.Abs(line.C - sign * expected[i].Z), 0, 1e-5 * (1 + Math.Abs(line.C)));
                }
            }
        }
    }

    [Fact]
    public void A_line_contains_the_match_of_its_point()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 42, count: 200))
        {
            foreach (var match in points.Select(point => Matches.Of(rig, point)))
            {
                Assert.InRange(Math.Abs(rig.FundamentalMatrix.LineInRight(match.Left).SignedDistance(match.Right)), 0, 1e-9);
                Assert.InRange(Math.Abs(rig.FundamentalMatrix.LineInLeft(match.Right).SignedDistance(match.Left)), 0, 1e-9);
            }
        }
    }

    [Fact]
    public void Coefficients_are_scaled_to_pixels()
    {
        var line = new EpipolarLine(3, 4, -10, View.Right);
        Assert.Equal((0.6, 0.8, -2.0), (line.A, line.B, line.C));
        Assert.Equal(3, line.SignedDistance(new(3, 4)), 12);
        Assert.Equal(0, line.SignedDistance(line.Nearest(new(30, -40))), 12);
    }

    [Fact]
    public void The_part_on_the_picture_ends_on_its_border()
    {
        var size = new PictureSize(640, 480);
        var random = new Random(43);
        for (var i = 0; i < 2000; i++)
        {
            var line = new EpipolarLine(RandomRigs.Gauss(random), RandomRigs.Gauss(random), 400 * RandomRigs.Gauss(random), View.Left);
            if (line.ClippedTo(size) is var (from, to))
            {
                foreach (var end in new[] { from, to })
                {
                    Assert.Equal(0, line.SignedDistance(end), 9);
                    Assert.InRange(end.U, -0.5 - 1e-9, 639.5 + 1e-9);
                    Assert.InRange(end.V, -0.5 - 1e-9, 479.5 + 1e-9);
                    var toBorder = new[] { end.U + 0.5, 639.5 - end.U, end.V + 0.5, 479.5 - end.V }.Min(Math.Abs);
                    Assert.Equal(0, toBorder, 9);
                }

                Assert.True((to.U - from.U) * line.Direction.U + (to.V - from.V) * line.Direction.V > 0);
            }
            else
            {
                // A line that misses has all four corners on one side.
                double[] sides = [.. new IdealPixel[] { new(-0.5, -0.5), new(639.5, -0.5), new(639.5, 479.5), new(-0.5, 479.5) }.Select(line.SignedDistance)];
                Assert.True(sides.All(side => side > 0) || sides.All(side => side < 0));
            }
        }
    }

    [Fact]
    public void Rows_and_columns_are_clipped_too()
    {
        var size = new PictureSize(640, 480);
        var row = new EpipolarLine(0, 2, -200, View.Left).ClippedTo(size)!.Value;
        Assert.Equal((new IdealPixel(-0.5, 100), new IdealPixel(639.5, 100)), row);
        var column = new EpipolarLine(-1, 0, 50, View.Left).ClippedTo(size)!.Value;
        Assert.Equal((new IdealPixel(50, -0.5), new IdealPixel(50, 479.5)), column);
        Assert.Null(new EpipolarLine(0, 1, 10, View.Left).ClippedTo(size));
        Assert.Null(new EpipolarLine(1, 0, -640, View.Left).ClippedTo(size));
    }

    [Fact]
    public void Coefficients_that_are_no_line_are_refused()
    {
        Assert.Throws<UserErrorException>(() => new EpipolarLine(0, 0, 1, View.Left));
        Assert.Throws<UserErrorException>(() => new EpipolarLine(double.NaN, 1, 1, View.Left));
        Assert.Throws<UserErrorException>(() => new EpipolarLine(1, 1, double.PositiveInfinity, View.Left));
    }

    [Fact]
    public void A_line_tells_its_equation() =>
        Assert.Equal("0.6·u − 0.8·v + 12.5 = 0 (right view, px)", new EpipolarLine(0.6, -0.8, 12.5, View.Right).ToString());
}
