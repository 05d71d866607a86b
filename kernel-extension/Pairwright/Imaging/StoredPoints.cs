using System.Collections.Immutable;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Points as a file holds them.</summary>
/// <param name="Positions">The points, in millimetres, in the frame that the writer used.</param>
/// <param name="Rgb">Red, green, blue by turns, three bytes a point; empty where the file holds no colours.</param>
/// <param name="SigmaMm">The standard uncertainty of each point, in millimetres; empty where the file holds none.</param>
public sealed record StoredPoints(ImmutableArray<Vector3D> Positions, ImmutableArray<byte> Rgb, ImmutableArray<float> SigmaMm);
