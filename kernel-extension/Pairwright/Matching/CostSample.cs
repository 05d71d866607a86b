using Pairwright.Geometry;

namespace Pairwright.Matching;

/// <summary>One position of a search along an epipolar curve.</summary>
/// <param name="Position">Where it lies in the right picture as the lens formed it.</param>
/// <param name="DepthMm">The depth along the left camera's axis that it stands for, in millimetres; infinite at infinity.</param>
/// <param name="AlongPx">The length of the curve from its first sample, in pixels of the right picture.</param>
/// <param name="Cost">How unlike the windows are, on the scale of the cost; the lower the better.</param>
public readonly record struct CostSample(RawPixel Position, double DepthMm, double AlongPx, double Cost);
