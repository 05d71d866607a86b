using Pairwright.Calibration;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Simulation;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Calibration;

public class A_knocked_rig_is_told_from_a_board(ITestOutputHelper output)
{
    private const double Degree = Math.PI / 180;

    [Theory]
    [InlineData("knock-pitch", 0.08, 0)]
    [InlineData("knock-yaw", 0, 0.05)]
    public void The_demos_knocks_are_found_by_axis_and_amount(string folder, double pitch, double yaw)
    {
        // The calibration comes from the boards before the knock, so that its own uncertainty is part of the answer.
        var path = Path.Combine(BoardData.DemoFolder, folder);
        var check = RigCheck.Of(BoardData.Demo.Rig, StereoPair.Read(Path.Combine(path, "left_board.png"), Path.Combine(path, "right_board.png")), BoardData.DemoBoard);
        output.WriteLine($"{check}; {check.AsCalibratedRmsPx:0.000} px, {check.TurnedRmsPx:0.000} px");
        Assert.False(check.Holds);
        foreach (var (turn, truth) in new[] { (check.Pitch, pitch), (check.Yaw, yaw), (check.Roll, 0.0) })
        {
            // Three turns, two captures: 3 σ each is a significance of 1.6 %.
            Assert.InRange(Math.Abs(turn.Degrees - truth), 0, 3 * turn.StandardUncertainty);
            Assert.InRange(turn.StandardUncertainty, 1e-4, 0.02);
        }
    }

    [Fact]
    public void A_board_before_the_same_rig_raises_no_alarm()
    {
        var left = Path.Combine(BoardData.DemoFolder, "boards", "left_01.png");
        var check = RigCheck.Of(BoardData.Demo.Rig, StereoPair.Read(left, left.Replace("left_", "right_", StringComparison.Ordinal)), BoardData.DemoBoard);
        output.WriteLine($"{check}");
        Assert.True(check.Holds);
    }

    [Fact]
    public void Turns_scatter_about_the_truth_as_their_uncertainty_says()
    {
        // 100 rigs drawn from the calibration's covariance and 100 noises: z² of three turns each is a chi-squared of 300 degrees if both parts are right;
        // 3.29 σ of its approximate normal (σ² = 600) is a significance of 0.1 %. The correlation of the three turns widens that by at most √3.
        var rig = BoardData.Demo.Rig;
        var truth = new Vector3D(0.06, -0.04, 0.03);
        var random = new Random(12);
        var sum = 0.0;
        for (var trial = 0; trial < 100; trial++)
        {
            var drawn = rig.Changed([.. rig.PrincipalChanges().Aggregate(new double[RigParameters.Count], (total, change) =>
            {
                var z = Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
                return [.. total.Zip(change, (a, b) => a + z * b)];
            })]);
            var knocked = new Rig(drawn.Left, drawn.Right, drawn.RightFromLeft.Then(new Pose(Rotation.FromVector(Degree * truth), default)));
            var view = BoardData.Noisy(BoardData.Views(knocked, BoardData.DemoBoard, 1, trial), 0.1, random)[0];
            var check = RigCheck.OfCorners(rig, view, BoardData.DemoBoard);
            double[] truths = [truth.X, truth.Y, truth.Z];
            sum += check.Turns.Zip(truths, (turn, known) => Math.Pow((turn.Degrees - known) / turn.StandardUncertainty, 2)).Sum();
        }

        output.WriteLine($"chi-squared {sum:0} of 300");
        var reach = 3.29 * Math.Sqrt(3) * Math.Sqrt(600);
        Assert.InRange(sum, 300 - reach, 300 + reach);
    }

    [Fact]
    public void Pictures_of_another_size_are_refused()
    {
        var small = new Picture(new(64, 48), new ushort[64 * 48]);
        var fault = Assert.Throws<UserErrorException>(() => RigCheck.Of(TarnHollow.Rig, new StereoPair(small, small, name: "small"), BoardData.DemoBoard));
        Assert.Contains("64 × 48", fault.Message, StringComparison.Ordinal);
    }
}
