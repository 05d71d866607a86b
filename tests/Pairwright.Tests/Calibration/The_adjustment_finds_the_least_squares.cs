using MathNet.Numerics;
using MathNet.Numerics.LinearAlgebra;
using Pairwright.Calibration;
using Pairwright.Geometry;
using Pairwright.Simulation;
using Xunit;

namespace Pairwright.Tests.Calibration;

public class The_adjustment_finds_the_least_squares
{
    private static readonly Board Board = Board.Checker(5, 4, 40);

    private static readonly CalibrationModel[] Models =
    [
        CalibrationModel.FiveTerms, CalibrationModel.Rational, CalibrationModel.TwoRadialTerms, CalibrationModel.FiveTerms with { SquarePixels = true },
    ];

    [Fact]
    public void Derivatives_are_those_of_central_differences()
    {
        var rig = TarnHollow.Rig;
        var views = BoardData.Views(rig, Board, 2, 3);
        var state = State(rig, [new(Rotation.FromVector(new(0.2, -0.3, 0.1)), new(-60, 40, 1000)), new(Rotation.FromVector(new(-0.4, 0.1, 0)), new(80, -70, 1300))]);
        foreach (var parameters in Models.Select(AdjustmentParameters.WholeRig).Append(AdjustmentParameters.RightTurnAlone))
        {
            var adjustment = new BoardAdjustment(Board, Corners(views), parameters);
            var (rowU, rowV) = (new double[parameters.Count + 6], new double[parameters.Count + 6]);
            foreach (var camera in new[] { View.Left, View.Right })
            {
                var at = adjustment.Derivatives(state, camera, 1, 7, rowU, rowV);
                for (var unknown = 0; unknown < rowU.Length; unknown++)
                {
                    var step = unknown < parameters.Count ? 1e-6 * Scale(parameters, unknown) : unknown < parameters.Count + 3 ? 1e-7 : 1e-4;
                    var (ahead, behind) = (Moved(unknown, step), Moved(unknown, -step));
                    Assert.Equal((ahead.U - behind.U) / (2 * step), rowU[unknown], 1e-6 * (1 + Math.Abs(rowU[unknown])));
                    Assert.Equal((ahead.V - behind.V) / (2 * step), rowV[unknown], 1e-6 * (1 + Math.Abs(rowV[unknown])));
                }

                RawPixel Moved(int unknown, double step)
                {
                    var shared = new double[parameters.Count];
                    double[][] poses = [new double[6], new double[6]];
                    (unknown < parameters.Count ? shared : poses[1])[unknown < parameters.Count ? unknown : unknown - parameters.Count] = step;
                    var (u, v) = (new double[rowU.Length], new double[rowV.Length]);
                    return adjustment.Derivatives(adjustment.Moved(state, shared, poses), camera, 1, 7, u, v);
                }

                Assert.True(double.IsFinite(at.U + at.V));
            }
        }
    }

    [Fact]
    public void Exact_corners_give_the_rig_back()
    {
        var calibration = RigCalibration.FromCorners(BoardData.Views(TarnHollow.Rig, BoardData.DemoBoard, 10, 4), BoardData.DemoBoard, TarnHollow.Rig.Left.Size, TarnHollow.Rig.Right.Size);
        Assert.True(calibration.StereoRmsPx < 1e-6);
        Assert.Equal(TarnHollow.Rig.BaselineMm, calibration.Rig.BaselineMm, 1e-5);
        Assert.Equal(TarnHollow.Rig.Left.Matrix.FocalU, calibration.Rig.Left.Matrix.FocalU, 1e-4);
        Assert.Equal(TarnHollow.Rig.Right.Distortion.K3, calibration.Rig.Right.Distortion.K3, 1e-4);
    }

    [Fact]
    public void Estimates_scatter_about_the_truth_as_their_covariance_says()
    {
        // 40 rigs from noisy corners. Each estimate minus truth, squared in the metric of its covariance, is a chi-squared of as many degrees as
        // parameters (JCGM 102:2011, 6.5.2); the sum of all lies in its central 99.9 %.
        var rig = TarnHollow.Rig;
        var (exact, boards) = BoardData.ViewsAndPoses(rig, BoardData.DemoBoard, 12, 5);
        var random = new Random(6);
        var parameters = AdjustmentParameters.WholeRig(CalibrationModel.FiveTerms);
        var free = Enumerable.Range(0, RigParameters.Count).Where(i => parameters.Unknown[i] >= 0).ToArray();
        const int Trials = 40;
        var sum = 0.0;
        for (var trial = 0; trial < Trials; trial++)
        {
            var (found, covariance) = Fitted(State(rig, boards), BoardData.Noisy(exact, 0.1, random), parameters);
            var scale = covariance.Diagonal().Map(Math.Sqrt);
            var correlation = Matrix<double>.Build.Dense(free.Length, free.Length, (i, j) => covariance[i, j] / (scale[i] * scale[j]));
            var error = Difference(found, rig, free).PointwiseDivide(scale);
            sum += error.DotProduct(correlation.Solve(error));
        }

        var degrees = Trials * free.Length;
        Assert.InRange(sum, ChiSquared(degrees, -3.29), ChiSquared(degrees, 3.29));
    }

    // The quantile of the chi-squared by the cube-root approximation of Wilson and Hilferty (1931).
    private static double ChiSquared(double degrees, double normal) => degrees * Math.Pow(1 - 2 / (9 * degrees) + normal * Math.Sqrt(2 / (9 * degrees)), 3);

    private static Vector<double> Difference(AdjustmentState found, Rig truth, int[] free)
    {
        var turn = Rotation.ToVector(found.RightFromLeft.Rotation * truth.RightFromLeft.Rotation.Transpose);
        var shift = found.RightFromLeft.Translation - truth.RightFromLeft.Translation;
        double[] all =
        [
            .. found.Cameras.Zip(CornerProjection.Parameters(truth.Left).Concat(CornerProjection.Parameters(truth.Right)), (a, b) => a - b),
            turn.X, turn.Y, turn.Z, shift.X, shift.Y, shift.Z,
        ];
        return Vector<double>.Build.DenseOfEnumerable(free.Select(i => all[i]));
    }

    // The joint adjustment alone, from the truth: the start does not matter to where the bottom is.
    private static (AdjustmentState State, Matrix<double> Covariance) Fitted(AdjustmentState truth, BoardCorners[] corners, AdjustmentParameters parameters)
    {
        var result = new BoardAdjustment(BoardData.DemoBoard, Corners(corners), parameters).Solve(truth);
        return (result.State, result.Variance * result.Cofactors!);
    }

    private static ViewCorners[] Corners(BoardCorners[] views) => [.. views.Select(view => new ViewCorners([.. view.Left], [.. view.Right]))];

    private static AdjustmentState State(Rig rig, Pose[] boards) =>
        new([.. CornerProjection.Parameters(rig.Left), .. CornerProjection.Parameters(rig.Right)], rig.RightFromLeft, boards);

    private static double Scale(AdjustmentParameters parameters, int unknown) =>
        Enumerable.Range(0, RigParameters.Count).First(i => parameters.Unknown[i] == unknown) switch
        {
            var i when RigParameters.Units[i] == "px" => 100,
            var i when RigParameters.Units[i] == "mm" => 10,
            _ => 0.1,
        };
}
