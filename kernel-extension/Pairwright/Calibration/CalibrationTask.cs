using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Calibration;

/// <summary>A calibration on its way from corners to a rig.</summary>
internal sealed class CalibrationTask(Board board, CalibrationModel model, PictureSize leftSize, PictureSize rightSize, Provenance provenance)
{
    /// <summary>Fewer views leave the lens and the pose between the cameras to chance.</summary>
    public const int LeastViews = 4;

    /// <summary>Estimates the rig and judges it.</summary>
    /// <param name="views">All views; those with a reason are not used.</param>
    /// <param name="progress">Told the share done.</param>
    /// <param name="cancellation">Stops the work.</param>
    public RigCalibration Run(IReadOnlyList<BoardView> views, IProgress<double>? progress, CancellationToken cancellation)
    {
        var used = views.Where(view => view.Used).ToArray();
        if (used.Length < LeastViews)
        {
            var why = views.FirstOrDefault(view => !view.Used)?.WhyNotUsed;
            throw new UserErrorException(
                $"A rig needs at least {LeastViews} views of the whole {board} in both pictures, but {used.Length} of {views.Count} can be used{(why is null ? "" : $" (first reason: {why.TrimEnd('.')})")}; capture more, or correct the board's counts.");
        }

        var (leftStart, leftPoses) = SingleCameraStart.Of([.. used.Select(view => view.Left)], board, leftSize, model);
        var (rightStart, rightPoses) = SingleCameraStart.Of([.. used.Select(view => view.Right)], board, rightSize, model);
        var order = HalfTurns.Resolve(used, leftPoses, rightPoses, board);
        used = order.Views;
        var single = (Left: Single(View.Left, used, leftStart, leftPoses, cancellation), Right: Single(View.Right, used, rightStart, order.RightPoses, cancellation));
        progress?.Report(0.3);

        var parameters = AdjustmentParameters.WholeRig(model);
        var corners = used.Select(view => new ViewCorners(view.Left, view.Right)).ToArray();
        var start = new AdjustmentState(
            [.. CornerProjection.Parameters(single.Left.Camera), .. CornerProjection.Parameters(single.Right.Camera)], order.RightFromLeft, leftPoses);
        var whole = new BoardAdjustment(board, corners, parameters).Solve(start, cancellation);
        var rig = ToRig(whole, parameters);
        progress?.Report(0.4);

        var judged = used.Select((view, i) => Judged(view, whole.State.LeftFromBoard[i], whole.Residuals[i], rig)).ToArray();
        var named = judged.Zip(Outliers.Among([.. judged.Select(view => view.RmsPx)]), (view, outlying) => view with { Outlying = outlying }).ToDictionary(view => view.Name);
        var leaveOneOut = HoldOut(used, corners, whole.State, progress, cancellation);
        var coverage = (Left: CoverageGrid.Of(leftSize, used.Select(view => view.Left)), Right: CoverageGrid.Of(rightSize, used.Select(view => view.Right)));
        ImmutableArray<BoardView> all = [.. views.Select(view => named.GetValueOrDefault(view.Name, view))];
        var stereoRms = whole.RmsPx;
        return new()
        {
            Board = board,
            Model = model,
            Rig = rig,
            Views = all,
            SingleLeft = single.Left,
            SingleRight = single.Right,
            StereoRmsPx = stereoRms,
            ResidualSigmaPx = Math.Sqrt(whole.Variance),
            DegreesOfFreedom = whole.DegreesOfFreedom,
            EpipolarRmsPx = Pooled(judged, view => view.EpipolarRmsPx),
            SideRmsMm = Pooled(judged, view => view.SideRmsMm),
            LeaveOneOut = leaveOneOut,
            CoverageLeft = coverage.Left,
            CoverageRight = coverage.Right,
            Advice = CaptureAdvice.For(all, coverage.Left, coverage.Right, stereoRms, leaveOneOut),
        };
    }

    // All used views show the same number of corners, so that mean squares of views weigh alike.
    private static double Pooled<T>(IReadOnlyCollection<T> items, Func<T, double> rms) => Math.Sqrt(items.Average(item => rms(item) * rms(item)));

    private CameraCalibration Single(View view, BoardView[] used, double[] start, Pose[] poses, CancellationToken cancellation)
    {
        var parameters = AdjustmentParameters.OneCamera(model);
        ViewCorners[] corners = [.. used.Select(board => new ViewCorners(view == View.Left ? board.Left : board.Right, []))];
        var result = new BoardAdjustment(board, corners, parameters).Solve(new([.. start, .. start], Pose.Identity, poses), cancellation);
        var covariance = parameters.Spread(result.Variance * Determined(result)).SubMatrix(0, RigParameters.RightCamera, 0, RigParameters.RightCamera);
        var camera = CornerProjection.Camera(result.State.Left, view == View.Left ? leftSize : rightSize);
        return new(view, camera, covariance, result.RmsPx, Math.Sqrt(result.Variance));
    }

    private Rig ToRig(AdjustmentResult result, AdjustmentParameters parameters) => new(
        CornerProjection.Camera(result.State.Left, leftSize),
        CornerProjection.Camera(result.State.Right, rightSize),
        result.State.RightFromLeft,
        parameters.Spread(result.Variance * Determined(result)),
        provenance.Then("calibrate", $"{board}; {model}; {result.Residuals.Length} views"));

    private static MathNet.Numerics.LinearAlgebra.Matrix<double> Determined(AdjustmentResult result) =>
        result.Cofactors ?? throw new UserErrorException(
            "The views do not determine all parameters of the cameras; capture the board tilted in several directions, or estimate fewer distortion terms.");

    private BoardView Judged(BoardView view, Pose leftFromBoard, (ImmutableArray<Residual> Left, ImmutableArray<Residual> Right) residuals, Rig rig)
    {
        var centre = leftFromBoard.Transform(0.5 * (board.Corners[0] + board.Corners[^1]));
        var normal = leftFromBoard.Rotation * new Vector3D(0, 0, 1);
        var sides = BoardGeometry.SidesMm(rig, board, view.Left, view.Right);
        return view with
        {
            LeftFromBoard = leftFromBoard,
            LeftResiduals = residuals.Left,
            RightResiduals = residuals.Right,
            EpipolarRmsPx = BoardGeometry.EpipolarRmsPx(rig, view.Left, view.Right),
            SideRmsMm = Math.Sqrt(sides.Average(side => (side - board.SquareMm) * (side - board.SquareMm))),
            TiltDegrees = Math.Acos(Math.Min(1, Math.Abs(normal.Dot(centre.Normalized)))) * 180 / Math.PI,
            DistanceMm = centre.Norm,
        };
    }

    private LeaveOneOut HoldOut(
        BoardView[] used, ViewCorners[] corners, AdjustmentState whole, IProgress<double>? progress, CancellationToken cancellation)
    {
        var parameters = AdjustmentParameters.WholeRig(model);
        var held = new HeldOutView[used.Length];
        var done = 0;
        Parallel.For(0, used.Length, new ParallelOptions { CancellationToken = cancellation }, i =>
        {
            var others = Enumerable.Range(0, used.Length).Where(view => view != i).ToArray();
            var without = new BoardAdjustment(board, [.. others.Select(view => corners[view])], parameters)
                .Solve(whole with { LeftFromBoard = [.. others.Select(view => whole.LeftFromBoard[view])] }, cancellation);
            var rig = ToRig(without, parameters);
            var fitted = new BoardAdjustment(board, [corners[i]], AdjustmentParameters.BoardsAlone)
                .Solve(without.State with { LeftFromBoard = [whole.LeftFromBoard[i]] }, cancellation);
            var sides = BoardGeometry.SidesMm(rig, board, used[i].Left, used[i].Right);
            held[i] = new(
                used[i].Name,
                rig,
                fitted.RmsPx,
                BoardGeometry.EpipolarRmsPx(rig, used[i].Left, used[i].Right),
                Math.Sqrt(sides.Average(side => (side - board.SquareMm) * (side - board.SquareMm))),
                sides.Average());
            progress?.Report(0.4 + 0.6 * Interlocked.Increment(ref done) / used.Length);
        });
        return new(
            [.. held], Pooled(held, view => view.ReprojectionRmsPx), Pooled(held, view => view.EpipolarRmsPx), Pooled(held, view => view.SideRmsMm));
    }
}
