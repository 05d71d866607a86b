using Pairwright.Geometry;
using Pairwright.Simulation;
using Xunit;

namespace Pairwright.Tests.Simulation;

public class Truth_is_exact
{
    /// <summary>
    /// Outside reference: the projection of <see cref="Camera"/>, which the geometry tests hold against OpenCV's. The surface point goes
    /// through the right camera's lens and back, and must come out on the row and at the column that the truth names.
    /// </summary>
    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void A_true_disparity_leads_to_where_the_right_camera_sees_the_surface_point(bool isVerged)
    {
        var rig = isVerged ? Scenes.Verged : Scenes.Parallel;
        var rectification = Rectification.Of(rig);
        var truth = Scenes.BoxAndBall.Truth(rectification);
        var compared = 0;
        for (var v = 0; v < rectification.Geometry.Size.Height; v += 3)
        {
            for (var u = 0; u < rectification.Geometry.Size.Width; u += 3)
            {
                if (!truth.VisibleInBoth[u, v])
                {
                    continue;
                }

                var exact = truth.At(new(u, v))!.Value;
                var raw = rig.Right.Project(rig.RightFromLeft.Transform(exact.Hit.Point));
                var seen = rectification.Rectify(View.Right, rig.Right.Undistort(raw));
                Assert.Equal(u - exact.Disparity, seen.U, 1e-6);
                Assert.Equal(v, seen.V, 1e-6);
                Assert.Equal(u - truth.Disparity[u, v], seen.U, 2e-5);
                Assert.Equal(exact.DepthMm, (rectification.Geometry.LeftFromRectified.Transpose * exact.Hit.Point).Z, 1e-7);
                compared++;
            }
        }

        Assert.True(compared > 1000, $"only {compared} pixels were compared");
    }

    /// <summary>
    /// Outside reference: a z-buffer from the other side, the usual way to find hidden surfaces (Catmull 1974): a point is hidden where the right
    /// camera's own depth map holds something nearer.
    /// </summary>
    [Fact]
    public void A_point_is_occluded_where_a_depth_map_of_the_right_camera_holds_something_nearer()
    {
        var rig = Scenes.Parallel;
        var rectification = SimulatedRig.Unturned(rig);
        var (width, height) = (rig.Left.Size.Width, rig.Left.Size.Height);
        var truth = Scenes.BoxAndBall.Truth(rectification);
        var buffer = new double[height, width];
        for (var v = 0; v < height; v++)
        {
            for (var u = 0; u < width; u++)
            {
                var direction = rig.Right.Matrix.Inverse * new Vector3D(u, v, 1);
                buffer[v, u] = Scenes.BoxAndBall.Cast(rig.RightCentreInLeft, direction)?.Distance ?? double.PositiveInfinity;
            }
        }

        var (compared, hidden) = (0, 0);
        for (var v = 1; v < height - 1; v++)
        {
            for (var u = 0; u < width; u++)
            {
                var right = (int)Math.Round(u - truth.Disparity[u, v]);
                if (float.IsNaN(truth.Disparity[u, v]) || right < 1 || right > width - 2)
                {
                    continue;
                }

                var around = from row in Enumerable.Range(v - 1, 3) from column in Enumerable.Range(right - 1, 3) select buffer[row, column];
                if (around.Max() - around.Min() > 0.02 * around.Min())
                {
                    continue;
                }

                Assert.Equal(buffer[v, right] < 0.98 * truth.DepthMm[u, v], truth.Occluded[u, v]);
                compared++;
                hidden += truth.Occluded[u, v] ? 1 : 0;
            }
        }

        Assert.True(compared > 15_000 && hidden > 200, $"{compared} pixels were compared, {hidden} of them hidden");
    }

    [Fact]
    public void A_plank_stands_as_high_as_its_formula_says()
    {
        var plank = TarnHollow.PlankScenes[2].Planks[0];
        var corners = new[] { (-1, -1), (1, -1), (1, 1), (-1, 1) }.Select(c => plank.Height(c.Item1 * plank.LengthMm / 2, c.Item2 * plank.WidthMm / 2)).ToArray();

        // The definitions of cup and twist themselves: the middle over the chord of the edges; the fourth corner over the plane of the others.
        Assert.Equal(plank.CupMm, (plank.Height(0, plank.WidthMm / 2) + plank.Height(0, -plank.WidthMm / 2)) / 2 - plank.Height(0, 0), 1e-12);
        Assert.Equal(-plank.TwistMm, corners[2] - (corners[1] + corners[3] - corners[0]), 1e-12);
    }
}
