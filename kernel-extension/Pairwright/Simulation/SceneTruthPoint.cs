namespace Pairwright.Simulation;

/// <summary>What one position of the left rectified picture truly shows.</summary>
/// <param name="Hit">The surface point, in the left camera's frame.</param>
/// <param name="Disparity">Its disparity, in pixels.</param>
/// <param name="DepthMm">Its depth Z along the rectified left axis, in millimetres.</param>
/// <param name="IsHiddenFromRight">Whether something hides it from the right camera.</param>
/// <param name="IsInRightPicture">Whether it falls on the right camera's raw and rectified pictures, hidden or not.</param>
public readonly record struct SceneTruthPoint(SurfaceHit Hit, double Disparity, double DepthMm, bool IsHiddenFromRight, bool IsInRightPicture);
