using Pairwright.Geometry;

namespace Pairwright.Simulation;

internal sealed class RubberTexture(int seed, double sawdust) : Texture
{
    private readonly ulong pebbles = IntegerHash.Part(seed, 1);
    private readonly ulong wear = IntegerHash.Part(seed, 20);
    private readonly ulong dust = IntegerHash.Part(seed, 40);
    private readonly ulong drifts = IntegerHash.Part(seed, 60);

    public override double Albedo(Vector3D point)
    {
        var (x, y) = (point.X + 0.83 * point.Z, point.Y + 0.61 * point.Z);
        var rubber = 0.085
            + 0.045 * LatticeNoise.Octaves(x / 3.2, y / 3.2, 2, pebbles)
            + 0.030 * LatticeNoise.Octaves(x / 14, y / 420, 2, wear);
        var drift = 0.5 + LatticeNoise.Gradient(x / 70, y / 160, drifts);
        var threshold = 0.68 - 0.28 * sawdust * drift;
        var grain = LatticeNoise.Rise(threshold, threshold + 0.14, LatticeNoise.Gradient(x / 2.6, y / 2.1, dust));
        return Math.Clamp(rubber + (0.42 - rubber) * 0.8 * grain * Math.Min(1, 2 * sawdust), 0.02, 0.95);
    }
}
