using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Measurement;
using Pairwright.Simulation;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Measurement;

/// <summary>The whole way from captures to a step's height with its uncertainty, two hundred times, against the height that the simulator built.</summary>
public class The_step_block_is_covered(ITestOutputHelper output)
{
    private const int Captures = 200;
    private const double BeltMm = 1100;

    [Fact]
    public void The_true_height_lies_within_the_expanded_uncertainty_in_95_of_100_captures()
    {
        // Each capture is taken by another rig, drawn from the covariance of the one that measures, of another block with other texture and noise.
        var rig = TestRig.Of(220, 190, 300, TestRig.Covariance(0.4, seed: 7));
        var draw = new MonteCarloDraw(31);
        var random = new Random(32);
        var results = new List<(double Error, MeasuredValue Step)>();
        for (var capture = 0; capture < Captures; capture++)
        {
            var height = 8 + 40 * random.NextDouble();
            var taken = draw.Rig(rig);
            var pair = Block(height, capture).Shoot(taken, 1000 + capture, Conditions).Pair;
            var rectified = new StereoPair(pair.Left, pair.Right, rig).Rectify();
            var depth = rectified.Match(Recipe.For(rectified.Geometry!, 1030, 1130)).ToDepth();
            PlaneFit PlaneOf(double y, double z) => depth.Within(Outlined(taken, y, z).In(rectified, insetPx: InsetPx)).FitPlane();

            var step = PlaneOf(-HalfMm, BeltMm - height).StepHeightOver(PlaneOf(HalfMm, BeltMm));
            results.Add((step.Value - height, step));
        }

        var covered = results.Count(result => Math.Abs(result.Error) <= result.Step.Expanded());
        var z = results.Select(result => result.Error / result.Step.StandardUncertainty).ToArray();
        output.WriteLine(
            $"{covered} of {Captures}; error mean {results.Average(r => r.Error):0.000} mm, RMS {Math.Sqrt(results.Average(r => r.Error * r.Error)):0.000} mm; "
            + $"u {results.Average(r => r.Step.StandardUncertainty):0.000} mm, random {results.Average(r => r.Step.RandomSigma):0.000}, common {results.Average(r => r.Step.CommonSigma):0.000}; RMS z {Math.Sqrt(z.Average(v => v * v)):0.00}");
        Assert.InRange(covered / (double)Captures, 0.91, 0.99);
    }

    // The block's edge runs across the picture: the block above it, the belt below. Windows of matching and refinement reach over the edge, so both planes stay away from it.
    private const double HalfMm = 110;
    private const double MiddleMm = 100;
    private const double WidthMm = 320;
    private const int InsetPx = 13;

    private static ShootingConditions Conditions { get; } = new()
    {
        RaysAcrossPixel = 2,
        BlurSigmaPx = 0.55,
        LeftExposure = 1.0,
        RightExposure = 0.93,
        Sensor = new(bits: 8, fullWellElectrons: 15_000, darkNoiseElectrons: 8),
    };

    private static Scene Block(double height, int seed) => new(
        [
            new("belt", new Plate(3000, 3000), Texture.Speckle(16, 5000 + seed, 0.15, 0.75), new Pose(Matrix3x3.Identity, new(0, 0, BeltMm))),
            new(
                "block",
                new Box(1200, 600, height),
                Texture.Speckle(16, 9000 + seed, 0.15, 0.75),
                new Pose(Matrix3x3.Identity, new(0, -300, BeltMm - height / 2))),
        ],
        [new(new(0.5, -0.4, -1), 0.42), new(new(-0.6, 0.3, -1), 0.28)]);

    // A rectangle parallel to the picture, in the left camera's frame, as the camera that took the capture sees it.
    private static SceneRegion Outlined(Rig taken, double y, double z) => new(
        "rectangle",
        [
            .. new[] { (-1, -1), (1, -1), (1, 1), (-1, 1) }.Select(corner => taken.Left.Project(new(MiddleMm + corner.Item1 * WidthMm / 2, y + corner.Item2 * HalfMm, z))),
        ],
        ImmutableSortedDictionary<string, double>.Empty);
}
