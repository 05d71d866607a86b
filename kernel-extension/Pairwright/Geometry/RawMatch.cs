namespace Pairwright.Geometry;

/// <summary>One scene point seen by both views, in raw pixels.</summary>
/// <param name="Left">Where the left picture shows it.</param>
/// <param name="Right">Where the right picture shows it.</param>
public readonly record struct RawMatch(RawPixel Left, RawPixel Right);
