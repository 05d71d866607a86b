namespace Pairwright.Geometry;

/// <summary>The angles that a camera sees, lens distortion included, in degrees.</summary>
/// <param name="AcrossDegrees">Between the middles of the left and right borders.</param>
/// <param name="DownDegrees">Between the middles of the upper and lower borders.</param>
/// <param name="DiagonalDegrees">Between opposite corners; the wider of the two diagonals.</param>
public readonly record struct FieldOfView(double AcrossDegrees, double DownDegrees, double DiagonalDegrees);
