using System.Collections.Immutable;
using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>The least squares of board calibration: cameras, pose between them and boards that together come nearest to the measured corners.</summary>
/// <remarks>
/// Levenberg–Marquardt (Marquardt 1963) with analytic derivatives. Each board's six unknowns meet no other board's, so they are
/// eliminated by their Schur complement (Brown 1958; Triggs et al. 2000) and only a system of the shared unknowns, at most thirty, is solved.
/// The corners are taken as independent with one common variance; that variance is estimated from the residuals and their degrees of
/// freedom (Gauss–Markov; JCGM 100:2008, H.3).
/// </remarks>
internal sealed class BoardAdjustment
{
    private const int PoseUnknowns = 6;
    private const int MostIterations = 200;

    private readonly Board board;
    private readonly IReadOnlyList<ViewCorners> views;
    private readonly AdjustmentParameters parameters;

    public BoardAdjustment(Board board, IReadOnlyList<ViewCorners> views, AdjustmentParameters parameters) =>
        (this.board, this.views, this.parameters) = (board, views, parameters);

    private int Shared => parameters.Count;

    /// <summary>Finds the least squares from a start.</summary>
    public AdjustmentResult Solve(AdjustmentState start, CancellationToken cancellation = default)
    {
        var state = start;
        var normal = Linearise(state);
        var damping = 1e-3;
        for (var iteration = 0; iteration < MostIterations && damping < 1e12; iteration++)
        {
            cancellation.ThrowIfCancellationRequested();
            if (Step(normal, damping) is not { } step)
            {
                damping *= 10;
                continue;
            }

            var trial = Moved(state, step.Shared, step.Poses);
            var cost = SumOfSquares(trial);
            if (!(cost < normal.SumOfSquares))
            {
                // At the bottom rounding alone decides; a predicted gain that small is no gain.
                if (step.PredictedGain <= 1e-12 * normal.SumOfSquares)
                {
                    break;
                }

                damping *= 10;
                continue;
            }

            state = trial;
            damping = Math.Max(damping / 10, 1e-12);
            normal = Linearise(state);
            if (step.PredictedGain <= 1e-14 * normal.SumOfSquares)
            {
                break;
            }
        }

        var corners = views.Sum(view => view.Left.Length + view.Right.Length);
        return new()
        {
            State = state,
            SumOfSquares = normal.SumOfSquares,
            Corners = corners,
            DegreesOfFreedom = 2 * corners - Shared - PoseUnknowns * views.Count,
            Cofactors = Cofactors(normal),
            Residuals = Residuals(state),
        };
    }

    /// <summary>Measured minus modelled, per view.</summary>
    public ImmutableArray<(ImmutableArray<Residual> Left, ImmutableArray<Residual> Right)> Residuals(AdjustmentState state) =>
    [
        .. views.Select((view, i) => (
            Residuals(view.Left, state.Cameras.AsMemory(0, RigParameters.RightCamera), state.LeftFromBoard[i]),
            Residuals(view.Right, state.Cameras.AsMemory(RigParameters.RightCamera), state.LeftFromBoard[i].Then(state.RightFromLeft)))),
    ];

    /// <summary>The state after a small change: shared unknowns, then six per board (turn after its rotation, shift).</summary>
    public AdjustmentState Moved(AdjustmentState state, IReadOnlyList<double> shared, IReadOnlyList<IReadOnlyList<double>> poses)
    {
        double Change(int parameter) => parameters.Unknown[parameter] is >= 0 and var unknown ? shared[unknown] : 0;

        var cameras = state.Cameras.Select((value, parameter) => value + Change(parameter)).ToArray();
        var turn = Rotation.FromVector(new(Change(24), Change(25), Change(26)));
        var shift = new Vector3D(Change(27), Change(28), Change(29));
        var (rotation, translation) = (state.RightFromLeft.Rotation, state.RightFromLeft.Translation);
        var rightFromLeft = new Pose(turn * rotation, (parameters.TurnAboutRightCentre ? turn * translation : translation) + shift);
        var boards = state.LeftFromBoard.Select((pose, i) => new Pose(
            Rotation.FromVector(new(poses[i][0], poses[i][1], poses[i][2])) * pose.Rotation,
            pose.Translation + new Vector3D(poses[i][3], poses[i][4], poses[i][5]))).ToArray();
        return new(cameras, rightFromLeft, boards);
    }

    /// <summary>The derivatives of one modelled corner coordinate: shared unknowns first, then the six of its own board.</summary>
    /// <remarks>Two rows (u, v) of <c>Shared + 6</c> numbers.</remarks>
    public RawPixel Derivatives(AdjustmentState state, View camera, int view, int corner, Span<double> rowU, Span<double> rowV)
    {
        Span<double> byPoint = stackalloc double[6];
        Span<double> byCamera = stackalloc double[2 * CornerProjection.CameraParameters];
        var pose = state.LeftFromBoard[view];
        var arm = pose.Rotation * board.Corners[corner];
        var inLeft = arm + pose.Translation;
        rowU.Clear();
        rowV.Clear();

        RawPixel pixel;
        Vector3D uByLeft, vByLeft;
        if (camera == View.Left)
        {
            pixel = CornerProjection.Project(state.Left, inLeft, byPoint, byCamera);
            (uByLeft, vByLeft) = (new(byPoint[0], byPoint[1], byPoint[2]), new(byPoint[3], byPoint[4], byPoint[5]));
            Scatter(byCamera, 0, rowU, rowV);
        }
        else
        {
            var (rotation, translation) = (state.RightFromLeft.Rotation, state.RightFromLeft.Translation);
            var turned = rotation * inLeft;
            var inRight = turned + translation;
            pixel = CornerProjection.Project(state.Right, inRight, byPoint, byCamera);
            var (uByRight, vByRight) = (new Vector3D(byPoint[0], byPoint[1], byPoint[2]), new Vector3D(byPoint[3], byPoint[4], byPoint[5]));
            Scatter(byCamera, RigParameters.RightCamera, rowU, rowV);

            // A turn ω after the rotation moves the point by ω × arm, and g·(ω × arm) = (arm × g)·ω.
            var rightArm = parameters.TurnAboutRightCentre ? inRight : turned;
            Scatter(rightArm.Cross(uByRight), RigParameters.RotationStart, rowU);
            Scatter(rightArm.Cross(vByRight), RigParameters.RotationStart, rowV);
            Scatter(uByRight, RigParameters.TranslationStart, rowU);
            Scatter(vByRight, RigParameters.TranslationStart, rowV);
            (uByLeft, vByLeft) = (rotation.Transpose * uByRight, rotation.Transpose * vByRight);
        }

        Put(arm.Cross(uByLeft), uByLeft, rowU[Shared..]);
        Put(arm.Cross(vByLeft), vByLeft, rowV[Shared..]);
        return pixel;
    }

    private void Scatter(ReadOnlySpan<double> byCamera, int start, Span<double> rowU, Span<double> rowV)
    {
        for (var i = 0; i < CornerProjection.CameraParameters; i++)
        {
            if (parameters.Unknown[start + i] is >= 0 and var unknown)
            {
                rowU[unknown] += byCamera[i];
                rowV[unknown] += byCamera[CornerProjection.CameraParameters + i];
            }
        }
    }

    private void Scatter(Vector3D gradient, int start, Span<double> row)
    {
        if (parameters.Unknown[start] is >= 0 and var unknown)
        {
            (row[unknown], row[unknown + 1], row[unknown + 2]) = (gradient.X, gradient.Y, gradient.Z);
        }
    }

    private static void Put(Vector3D turn, Vector3D shift, Span<double> six) =>
        (six[0], six[1], six[2], six[3], six[4], six[5]) = (turn.X, turn.Y, turn.Z, shift.X, shift.Y, shift.Z);

    private double SumOfSquares(AdjustmentState state)
    {
        var sum = 0.0;
        for (var view = 0; view < views.Count; view++)
        {
            var left = state.LeftFromBoard[view];
            sum += SumOfSquares(views[view].Left, state.Left, left) + SumOfSquares(views[view].Right, state.Right, left.Then(state.RightFromLeft));
        }

        return sum;
    }

    private double SumOfSquares(ImmutableArray<RawPixel> measured, ReadOnlySpan<double> camera, Pose pose)
    {
        var sum = 0.0;
        for (var i = 0; i < measured.Length; i++)
        {
            var modelled = CornerProjection.Project(camera, pose.Transform(board.Corners[i]));
            var (du, dv) = (measured[i].U - modelled.U, measured[i].V - modelled.V);
            sum += du * du + dv * dv;
        }

        return sum;
    }

    private ImmutableArray<Residual> Residuals(ImmutableArray<RawPixel> measured, ReadOnlyMemory<double> camera, Pose pose) =>
    [
        .. measured.Select((pixel, i) =>
        {
            var modelled = CornerProjection.Project(camera.Span, pose.Transform(board.Corners[i]));
            return new Residual(pixel.U - modelled.U, pixel.V - modelled.V);
        }),
    ];

    private NormalEquations Linearise(AdjustmentState state)
    {
        var normal = new NormalEquations(Shared, views.Count);
        var width = Shared + PoseUnknowns;
        var rows = new double[2 * width];
        var rowU = rows.AsSpan(0, width);
        var rowV = rows.AsSpan(width);
        for (var view = 0; view < views.Count; view++)
        {
            foreach (var camera in (ReadOnlySpan<View>)[View.Left, View.Right])
            {
                var measured = camera == View.Left ? views[view].Left : views[view].Right;
                for (var corner = 0; corner < measured.Length; corner++)
                {
                    var modelled = Derivatives(state, camera, view, corner, rowU, rowV);
                    normal.Add(view, rowU, measured[corner].U - modelled.U);
                    normal.Add(view, rowV, measured[corner].V - modelled.V);
                }
            }
        }

        return normal;
    }

    // The damped step and the gain in the sum of squares that the linearised problem promises; nothing where the system is singular.
    private static (double[] Shared, double[][] Poses, double PredictedGain)? Step(NormalEquations normal, double damping)
    {
        if (normal.Reduce(damping) is not { } reduced)
        {
            return null;
        }

        var shared = reduced.SolveShared();
        var poses = reduced.SolvePoses(shared);
        var gain = 0.0;
        for (var i = 0; i < shared.Length; i++)
        {
            gain += shared[i] * (damping * normal.SharedDiagonal(i) * shared[i] + normal.SharedRight(i));
        }

        for (var view = 0; view < poses.Length; view++)
        {
            for (var i = 0; i < PoseUnknowns; i++)
            {
                gain += poses[view][i] * (damping * normal.PoseDiagonal(view, i) * poses[view][i] + normal.PoseRight(view, i));
            }
        }

        return (shared, poses, gain);
    }

    private static Matrix<double>? Cofactors(NormalEquations normal) => normal.Reduce(0)?.Cofactors();
}
