using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>One view seen by a rig that was calibrated without it.</summary>
/// <param name="Name">The view's name.</param>
/// <param name="Rig">The rig calibrated from the other views alone, with its covariance.</param>
/// <param name="ReprojectionRmsPx">Root of the mean squared residual over both pictures when only the board's pose is fitted to the view, in pixels.</param>
/// <param name="EpipolarRmsPx">Root of the mean squared distance of the right corners from the epipolar lines of the left ones, in ideal pixels of the right view.</param>
/// <param name="SideRmsMm">Root of the mean squared difference between triangulated sides of neighbouring corners and the stated square, in millimetres.</param>
/// <param name="SideMeanMm">The mean triangulated side, in millimetres.</param>
public sealed record HeldOutView(string Name, Rig Rig, double ReprojectionRmsPx, double EpipolarRmsPx, double SideRmsMm, double SideMeanMm);
