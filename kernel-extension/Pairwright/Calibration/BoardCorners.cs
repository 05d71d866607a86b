using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>The inner corners of one board view as both cameras formed them.</summary>
/// <param name="Name">The view's name, for reports.</param>
/// <param name="Left">Raw pixels in the left picture, in the order of <see cref="Board.Corners"/>.</param>
/// <param name="Right">Raw pixels in the right picture, in the same order.</param>
public sealed record BoardCorners(string Name, IReadOnlyList<RawPixel> Left, IReadOnlyList<RawPixel> Right);
