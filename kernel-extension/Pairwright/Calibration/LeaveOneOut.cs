using System.Collections.Immutable;

namespace Pairwright.Calibration;

/// <summary>What the calibration is worth on views that it has not seen: each view in turn is left out, the rig calibrated anew, and the view judged by it.</summary>
/// <remarks>Cross-validation by leaving one out (Stone 1974). All figures pool the corners, or sides, of all views.</remarks>
/// <param name="Views">One entry per used view, in the order of the views.</param>
/// <param name="ReprojectionRmsPx">Root mean square over all held-out corners of both pictures with only the board's pose fitted, in pixels.</param>
/// <param name="EpipolarRmsPx">Root mean square distance of held-out right corners from the epipolar lines of the left ones, in ideal pixels of the right view.</param>
/// <param name="SideRmsMm">Root mean square difference between triangulated sides of held-out neighbouring corners and the stated square, in millimetres.</param>
public sealed record LeaveOneOut(ImmutableArray<HeldOutView> Views, double ReprojectionRmsPx, double EpipolarRmsPx, double SideRmsMm);
