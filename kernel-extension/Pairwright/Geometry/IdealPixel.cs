namespace Pairwright.Geometry;

/// <summary>A position where an undistorted lens with the same camera matrix would have formed the point.</summary>
/// <remarks>Fundamental matrices, epipolar lines, rectification and triangulation live here. (0, 0) is the centre of the top-left pixel.</remarks>
/// <param name="U">To the right, in pixels.</param>
/// <param name="V">Down, in pixels.</param>
public readonly record struct IdealPixel(double U, double V)
{
    /// <summary>The position, in pixels.</summary>
    public override string ToString() => FormattableString.Invariant($"({U:0.###}, {V:0.###}) px");
}
