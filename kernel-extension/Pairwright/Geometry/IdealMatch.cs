namespace Pairwright.Geometry;

/// <summary>One scene point seen by both views, in ideal pixels.</summary>
/// <remarks>For uncalibrated pictures, whose lenses are not known, raw positions stand in for ideal ones.</remarks>
/// <param name="Left">Where the left view sees it.</param>
/// <param name="Right">Where the right view sees it.</param>
public readonly record struct IdealMatch(IdealPixel Left, IdealPixel Right);
