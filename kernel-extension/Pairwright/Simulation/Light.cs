using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>A light so far away that it comes from one direction.</summary>
/// <param name="Towards">The direction from the scene towards the light, in the scene's frame, of any length above zero.</param>
/// <param name="Strength">What it adds to the radiance of a white surface that faces it; 1 just saturates a camera at exposure 1.</param>
public sealed record Light(Vector3D Towards, double Strength);
