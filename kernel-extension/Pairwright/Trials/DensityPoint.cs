namespace Pairwright.Trials;

/// <summary>One point of a curve of error against density.</summary>
/// <param name="Density">The share of pixels taken in, the most confident first, 0 to 1.</param>
/// <param name="WrongShare">The share of these that are wrong, 0 to 1.</param>
public readonly record struct DensityPoint(double Density, double WrongShare);
