using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Calibration;

/// <summary>A rig calibrated from captures of a checkerboard, with everything that tells how good it is.</summary>
public sealed class RigCalibration
{
    internal RigCalibration()
    {
    }

    /// <summary>The board.</summary>
    public required Board Board { get; init; }

    /// <summary>What was estimated.</summary>
    public required CalibrationModel Model { get; init; }

    /// <summary>The rig, with the covariance of all its parameters and its provenance.</summary>
    public required Rig Rig { get; init; }

    /// <summary>All views in the order of their capture, those not used included.</summary>
    public required ImmutableArray<BoardView> Views { get; init; }

    /// <summary>The left camera calibrated alone.</summary>
    public required CameraCalibration SingleLeft { get; init; }

    /// <summary>The right camera calibrated alone.</summary>
    public required CameraCalibration SingleRight { get; init; }

    /// <summary>Root of the mean squared length of the residuals of all corners in both pictures, in pixels.</summary>
    public required double StereoRmsPx { get; init; }

    /// <summary>The standard deviation s of one corner coordinate: the root of the sum of squares over the degrees of freedom, in pixels.</summary>
    public required double ResidualSigmaPx { get; init; }

    /// <summary>Measured coordinates minus estimated parameters.</summary>
    public required int DegreesOfFreedom { get; init; }

    /// <summary>Root of the mean squared distance of the right corners from the epipolar lines of the left ones, in ideal pixels of the right view; in sample.</summary>
    public required double EpipolarRmsPx { get; init; }

    /// <summary>Root of the mean squared difference between triangulated sides of neighbouring corners and the stated square, in millimetres; in sample.</summary>
    public required double SideRmsMm { get; init; }

    /// <summary>The same figures on views that the calibration has not seen.</summary>
    public required LeaveOneOut LeaveOneOut { get; init; }

    /// <summary>Where in the left picture corners were seen.</summary>
    public required Coverage CoverageLeft { get; init; }

    /// <summary>Where in the right picture corners were seen.</summary>
    public required Coverage CoverageRight { get; init; }

    /// <summary>What to capture next, or to look into, one sentence each; empty when nothing is missing.</summary>
    public required ImmutableArray<string> Advice { get; init; }

    /// <summary>The rule by which a view is called outlying, in words.</summary>
    public static string OutlyingRule => Outliers.Rule;

    /// <summary>Calibrates from a folder of left and right captures.</summary>
    /// <param name="folder">A folder laid out as <c>StereoPair.ReadFolder</c> takes it, such as left01.jpg … and right01.jpg ….</param>
    /// <param name="board">The board in the pictures.</param>
    /// <param name="model">What to estimate; five distortion terms a camera when left out.</param>
    /// <param name="progress">Told the share done, 0 to 1.</param>
    /// <param name="cancellation">Stops the work.</param>
    /// <exception cref="UserErrorException">The folder holds no pairs, sizes differ, or fewer than four views show the whole board.</exception>
    public static RigCalibration FromBoards(
        string folder, Board board, CalibrationModel? model = null, IProgress<double>? progress = null, CancellationToken cancellation = default) =>
        FromBoards(StereoPair.ReadFolder(folder), board, model, progress, cancellation);

    /// <summary>Calibrates from captures.</summary>
    /// <param name="pairs">One pair per pose of the board.</param>
    /// <param name="board">The board in the pictures.</param>
    /// <param name="model">What to estimate; five distortion terms a camera when left out.</param>
    /// <param name="progress">Told the share done, 0 to 1.</param>
    /// <param name="cancellation">Stops the work.</param>
    /// <exception cref="UserErrorException">Sizes differ, or fewer than four views show the whole board.</exception>
    public static RigCalibration FromBoards(
        IReadOnlyList<StereoPair> pairs, Board board, CalibrationModel? model = null, IProgress<double>? progress = null, CancellationToken cancellation = default)
    {
        ArgumentNullException.ThrowIfNull(pairs);
        ArgumentNullException.ThrowIfNull(board);
        RequireOneSize(pairs);
        var views = new BoardView[pairs.Count];
        var done = 0;
        Parallel.For(0, pairs.Count, new ParallelOptions { CancellationToken = cancellation }, i =>
        {
            views[i] = FindBoard(pairs[i], pairs[i].Name, board);
            progress?.Report(FindingShare * Interlocked.Increment(ref done) / pairs.Count);
        });
        var provenance = pairs.Skip(1).Aggregate(pairs[0].Provenance, (all, pair) => all.With(pair.Provenance));
        return new CalibrationTask(board, model ?? CalibrationModel.FiveTerms, pairs[0].Left.Size, pairs[0].Right.Size, provenance)
            .Run(views, progress is null ? null : new LaterShare(progress), cancellation);
    }

    /// <summary>Calibrates from corners that were found before.</summary>
    /// <param name="corners">One entry per pose of the board.</param>
    /// <param name="board">The board.</param>
    /// <param name="leftSize">The size of the left pictures.</param>
    /// <param name="rightSize">The size of the right pictures.</param>
    /// <param name="model">What to estimate; five distortion terms a camera when left out.</param>
    /// <param name="progress">Told the share done, 0 to 1.</param>
    /// <param name="cancellation">Stops the work.</param>
    /// <exception cref="UserErrorException">A view has another number of corners than the board, or there are fewer than four views.</exception>
    public static RigCalibration FromCorners(
        IReadOnlyList<BoardCorners> corners,
        Board board,
        PictureSize leftSize,
        PictureSize rightSize,
        CalibrationModel? model = null,
        IProgress<double>? progress = null,
        CancellationToken cancellation = default)
    {
        ArgumentNullException.ThrowIfNull(corners);
        ArgumentNullException.ThrowIfNull(board);
        foreach (var view in corners)
        {
            if (view.Left.Count != board.CornerCount || view.Right.Count != board.CornerCount)
            {
                throw new UserErrorException(
                    $"View {view.Name} has {view.Left.Count} left and {view.Right.Count} right corners, but the {board} has {board.CornerCount}; give all corners of both pictures.");
            }
        }

        var views = corners.Select(view => new BoardView { Name = view.Name, Left = [.. view.Left], Right = [.. view.Right] }).ToArray();
        return new CalibrationTask(board, model ?? CalibrationModel.FiveTerms, leftSize, rightSize, Provenance.None).Run(views, progress, cancellation);
    }

    // Finding the board takes about half of the whole time.
    private const double FindingShare = 0.5;

    private static BoardView FindBoard(StereoPair pair, string name, Board board)
    {
        var (left, right) = (CornerFinder.Find(pair.Left, board), CornerFinder.Find(pair.Right, board));
        var missing = (left.IsEmpty, right.IsEmpty) switch
        {
            (true, true) => "either picture",
            (true, false) => "the left picture",
            (false, true) => "the right picture",
            _ => null,
        };
        return new()
        {
            Name = name,
            Pair = pair,
            Left = left,
            Right = right,
            WhyNotUsed = missing is null ? null : $"The {board} is not wholly seen in {missing} of view {name}; show the whole board, sharp and without glare.",
        };
    }

    private static void RequireOneSize(IReadOnlyList<StereoPair> pairs)
    {
        if (pairs.Count == 0)
        {
            throw new UserErrorException("There are no pairs to calibrate from; capture the board with both cameras, ten times or more.");
        }

        foreach (var pair in pairs)
        {
            if (pair.Left.Size != pairs[0].Left.Size || pair.Right.Size != pairs[0].Right.Size)
            {
                throw new UserErrorException(
                    $"The pictures of '{pair.Name}' are {pair.Left.Size} and {pair.Right.Size} px, but those of '{pairs[0].Name}' are {pairs[0].Left.Size} and {pairs[0].Right.Size} px; calibrate with captures of one size.");
            }
        }
    }

    private sealed class LaterShare(IProgress<double> whole) : IProgress<double>
    {
        public void Report(double value) => whole.Report(FindingShare + (1 - FindingShare) * value);
    }
}
