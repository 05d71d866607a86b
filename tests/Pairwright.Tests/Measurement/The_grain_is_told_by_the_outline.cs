using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Measurement;
using Xunit;

namespace Pairwright.Tests.Measurement;

public class The_grain_is_told_by_the_outline
{
    private static readonly Vector3D Along = Rotation.FromVector(new(0.05, 0.1, 0.03)) * new Vector3D(1, 0, 0);
    private static readonly Vector3D Across = Rotation.FromVector(new(0.05, 0.1, 0.03)) * new Vector3D(0, 1, 0);
    private static readonly Vector3D Middle = new(20, -10, 1100);

    [Fact]
    public void The_direction_across_a_plank_is_found_though_a_slanted_piece_of_it_was_not_measured()
    {
        var rig = TestRig.Of();
        var region = Outlined(rig, 200, 60);
        var measured = TestRig.Grid(Middle, Along, Across, 200, 60).Where(point => Along.Dot(point - Middle) < 50 + Across.Dot(point - Middle)).ToArray();
        var (lefts, rights) = TestRig.Seen(rig, measured);
        var points = MeasuredPoints.FromCorners(rig, lefts, rights, 0.1);

        Assert.Equal(1, Math.Abs(region.AcrossGrain(points).Dot(Across)), 1e-9);

        // The points alone, some of them missing, would be off by more than a degree.
        Assert.True(Math.Abs(points.FitQuadratic().Across.Dot(Across)) < Math.Cos(Math.PI / 180));
    }

    [Fact]
    public void An_outline_as_wide_as_it_is_long_tells_no_grain()
    {
        var rig = TestRig.Of();
        var (lefts, rights) = TestRig.Seen(rig, TestRig.Grid(Middle, Along, Across, 80, 80));
        var fault = Assert.Throws<UserErrorException>(() => Outlined(rig, 80, 80).AcrossGrain(MeasuredPoints.FromCorners(rig, lefts, rights, 0.1)));
        Assert.Contains("as wide as it is long", fault.Message, StringComparison.Ordinal);
    }

    private static SceneRegion Outlined(Rig rig, double length, double width) => new(
        "plank",
        [
            .. new[] { (-1, -1), (1, -1), (1, 1), (-1, 1) }.Select(corner =>
                rig.Left.Project(Middle + corner.Item1 * length / 2 * Along + corner.Item2 * width / 2 * Across)),
        ],
        ImmutableSortedDictionary<string, double>.Empty);
}
