using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Calibration;

/// <summary>Whether a rig's calibration still holds on a new capture of a board: how far the right camera is turned now from where the calibration has it.</summary>
/// <remarks>
/// <para>
/// The board's pose and a turn of the right camera about its own centre are fitted to the corners by least squares, everything else as calibrated. The
/// turn is about the right camera's axes: X to the right (pitch), Y down (yaw), Z forward (roll). Yaw hides in depth alone, so it takes a board
/// of known squares to see it; pitch and roll move rows.
/// </para>
/// <para>
/// The random part of each uncertainty comes from the scatter of the corners about the fit, the common part from the rig's covariance (JCGM 100:2008, 5.2, by
/// central differences along its principal axes).
/// </para>
/// </remarks>
public sealed class RigCheck
{
    private const double Degrees = 180 / Math.PI;

    private RigCheck(Rig rig, string name, ImmutableArray<AxisTurn> turns, double asCalibratedRmsPx, double turnedRmsPx)
    {
        (Rig, Name, Turns, AsCalibratedRmsPx, TurnedRmsPx) = (rig, name, turns, asCalibratedRmsPx, turnedRmsPx);
    }

    /// <summary>The rig as it was calibrated.</summary>
    public Rig Rig { get; }

    /// <summary>The name of the capture.</summary>
    public string Name { get; }

    /// <summary>Pitch, yaw and roll of the right camera since the calibration.</summary>
    public ImmutableArray<AxisTurn> Turns { get; }

    /// <summary>About the right camera's X axis; a positive pitch moves what it sees towards smaller rows.</summary>
    public AxisTurn Pitch => Turns[0];

    /// <summary>About the right camera's Y axis.</summary>
    public AxisTurn Yaw => Turns[1];

    /// <summary>About the right camera's viewing direction.</summary>
    public AxisTurn Roll => Turns[2];

    /// <summary>Root mean square residual of the corners with the rig as calibrated and only the board's pose fitted, in pixels.</summary>
    public double AsCalibratedRmsPx { get; }

    /// <summary>The same with the turn fitted too, in pixels: what a turn alone cannot explain.</summary>
    public double TurnedRmsPx { get; }

    /// <summary>Whether no turn exceeds its expanded uncertainty (k = 3).</summary>
    /// <remarks>Three instead of two, since three turns are looked at on every capture: a rig that holds is doubted on fewer than one capture in a hundred.</remarks>
    public bool Holds => Turns.All(turn => Math.Abs(turn.Degrees) <= 3 * turn.StandardUncertainty);

    /// <summary>Checks a rig on a capture of a board.</summary>
    /// <param name="rig">The rig.</param>
    /// <param name="pair">The capture.</param>
    /// <param name="board">The board.</param>
    /// <exception cref="UserErrorException">The board is not wholly seen, or the pictures are not of the rig's size.</exception>
    public static RigCheck Of(Rig rig, StereoPair pair, Board board)
    {
        ArgumentNullException.ThrowIfNull(rig);
        ArgumentNullException.ThrowIfNull(pair);
        ArgumentNullException.ThrowIfNull(board);
        foreach (var view in Enum.GetValues<View>())
        {
            if (pair[view].Size != rig[view].Size)
            {
                throw new UserErrorException(
                    $"The {view.ToString().ToLowerInvariant()} picture of '{pair.Name}' has {pair[view].Size} px, but the rig was calibrated at {rig[view].Size} px; capture at the calibrated size.");
            }
        }

        var corners = new BoardCorners(pair.Name, CornerFinder.Find(pair.Left, board), CornerFinder.Find(pair.Right, board));
        if (corners.Left.Count == 0 || corners.Right.Count == 0)
        {
            throw new UserErrorException($"The {board} is not wholly seen in both pictures of '{pair.Name}'; show the whole board, sharp and without glare.");
        }

        return OfCorners(rig, corners, board);
    }

    /// <summary>Checks a rig on corners that were found before.</summary>
    /// <param name="rig">The rig.</param>
    /// <param name="corners">The corners.</param>
    /// <param name="board">The board.</param>
    /// <exception cref="UserErrorException">There are not as many corners as the board has, or they are not those of a board before the left camera.</exception>
    public static RigCheck OfCorners(Rig rig, BoardCorners corners, Board board)
    {
        ArgumentNullException.ThrowIfNull(rig);
        ArgumentNullException.ThrowIfNull(corners);
        ArgumentNullException.ThrowIfNull(board);
        if (corners.Left.Count != board.CornerCount || corners.Right.Count != board.CornerCount)
        {
            throw new UserErrorException(
                $"View {corners.Name} has {corners.Left.Count} left and {corners.Right.Count} right corners, but the {board} has {board.CornerCount}; give all corners of both pictures.");
        }

        ViewCorners[] view = [new([.. corners.Left], [.. corners.Right])];
        var still = new BoardAdjustment(board, view, AdjustmentParameters.BoardsAlone).Solve(State(rig, BoardStart.Of(rig.Left, view[0].Left, board, corners.Name)));
        AdjustmentResult Turned(Rig with) => new BoardAdjustment(board, view, AdjustmentParameters.RightTurnAlone).Solve(State(with, still.State.LeftFromBoard[0]));
        Vector3D TurnOf(Rig with) => Rotation.ToVector(Turned(with).State.RightFromLeft.Rotation * with.RightFromLeft.Rotation.Transpose);

        var nominal = Turned(rig);
        var cofactors = nominal.Cofactors ?? throw new UserErrorException($"The corners of view {corners.Name} do not determine a turn; show the board larger in the picture.");
        var turn = TurnOf(rig);
        var effects = rig.PrincipalChanges().Select(change =>
            0.5 * (TurnOf(rig.Changed(change)) - TurnOf(rig.Changed([.. change.Select(value => -value)])))).ToArray();
        AxisTurn Axis(string name, int axis, Func<Vector3D, double> component) => new(
            name,
            Degrees * component(turn),
            Degrees * Math.Sqrt(nominal.Variance * cofactors[axis, axis]),
            rig.Covariance is null ? double.NaN : Degrees * Math.Sqrt(effects.Sum(effect => component(effect) * component(effect))));
        return new(
            rig, corners.Name, [Axis("pitch", 0, v => v.X), Axis("yaw", 1, v => v.Y), Axis("roll", 2, v => v.Z)], still.RmsPx, nominal.RmsPx);
    }

    private static AdjustmentState State(Rig rig, Pose board) =>
        new([.. CornerProjection.Parameters(rig.Left), .. CornerProjection.Parameters(rig.Right)], rig.RightFromLeft, [board]);

    /// <summary>The turns and whether the calibration holds.</summary>
    public override string ToString() => $"{string.Join(", ", Turns)}; the calibration {(Holds ? "holds" : "does not hold")}";
}
