using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>All unknowns of an adjustment: both cameras, the pose between them, and the board's pose in each view.</summary>
/// <param name="Cameras">Twice twelve parameters, left first.</param>
/// <param name="RightFromLeft">X_right = R·X_left + t.</param>
/// <param name="LeftFromBoard">The board's pose per view.</param>
internal sealed record AdjustmentState(double[] Cameras, Pose RightFromLeft, Pose[] LeftFromBoard)
{
    public ReadOnlySpan<double> Left => Cameras.AsSpan(0, RigParameters.RightCamera);

    public ReadOnlySpan<double> Right => Cameras.AsSpan(RigParameters.RightCamera);
}
