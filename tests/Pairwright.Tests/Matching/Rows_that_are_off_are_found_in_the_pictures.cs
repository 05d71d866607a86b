using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Simulation;
using Pairwright.Tests.Calibration;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Matching;

/// <summary>Planks whose grain runs along the rows, rectified by a rig that differs from the true one: the case in which rows that are off pass for disparity.</summary>
public class Rows_that_are_off_are_found_in_the_pictures(ITestOutputHelper output)
{
    [Fact]
    public void The_calibrated_rigs_row_error_is_found_to_a_hundredth_of_a_pixel()
    {
        // Truth: the simulator's rig says where both cameras see a point of a plank's top, the calibrated one how far apart it puts the rows.
        var (rig, truth) = (BoardData.Demo.Rig, TarnHollow.Rig);
        var folder = Path.Combine(BoardData.DemoFolder, "planks-1");
        var rectified = StereoPair.ReadFolder(folder, rig)[0].Rectify();
        var map = rectified.Match(Recipe.For(rectified.Geometry!, 1000, 1150));
        var rectification = rectified.Rectification!;
        var errors = new List<double>();
        foreach (var region in SceneSheet.Read(Path.Combine(folder, "scene.yaml")).Regions)
        {
            foreach (var (across, down) in new[] { (0.25, 0.25), (0.5, 0.5), (0.75, 0.75), (0.25, 0.75), (0.75, 0.25) })
            {
                var (us, vs) = (region.Outline.Select(pixel => pixel.U).ToArray(), region.Outline.Select(pixel => pixel.V).ToArray());
                var pixel = new RawPixel(us.Min() + across * (us.Max() - us.Min()), vs.Min() + down * (vs.Max() - vs.Min()));
                var ray = truth.Left.Ray(truth.Left.Undistort(pixel));
                var point = 1072 / ray.Z * ray;
                var match = new RawMatch(pixel, truth.Right.Project(truth.RightFromLeft.Transform(point)));
                var at = rectification.Rectify(View.Left, pixel);
                errors.Add(map.RowOffset!.At(at.U, at.V) - rectification.RowError(match));
            }
        }

        output.WriteLine($"{map.RowOffset}, scatter {map.RowOffset!.ScatterRatio:0.00}; errors {string.Join(" ", errors.Select(error => $"{error:0.000}"))} px");
        Assert.True(map.RowOffset.RmsPx > 0.015);
        Assert.All(errors, error => Assert.InRange(error, -0.02, 0.02));
        Assert.True(Math.Sqrt(errors.Average(error => error * error)) < 0.01);
        Assert.InRange(map.RowOffset.ScatterRatio, 0.7, 1.5);
    }

    [Fact]
    public void A_pair_with_too_little_texture_says_that_its_rows_are_not_known()
    {
        var flat = new Picture(new(120, 90), new ushort[120 * 90]);
        var map = new RectifiedPair(flat, flat).Match(Recipe.For(new DisparityRange(0, 16)));
        Assert.Equal(0, map.RowOffset!.Windows);
        Assert.Equal(0, map.RowOffset.At(60, 45));
        Assert.True(double.IsNaN(map.RowOffset.SigmaPx));
    }
}
