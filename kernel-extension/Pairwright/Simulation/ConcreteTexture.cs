using Pairwright.Geometry;

namespace Pairwright.Simulation;

internal sealed class ConcreteTexture(int seed) : Texture
{
    private readonly ulong clouds = IntegerHash.Part(seed, 1);
    private readonly ulong sand = IntegerHash.Part(seed, 20);
    private readonly ulong holes = IntegerHash.Part(seed, 40);

    public override double Albedo(Vector3D point)
    {
        var (x, y) = (point.X + 0.83 * point.Z, point.Y + 0.61 * point.Z);
        var albedo = 0.45
            + 0.10 * LatticeNoise.Octaves(x / 90, y / 90, 4, clouds)
            + 0.08 * LatticeNoise.Octaves(x / 3.5, y / 3.5, 2, sand);
        var pinhole = LatticeNoise.Rise(0.50, 0.62, LatticeNoise.Gradient(x / 6, y / 6, holes));
        return Math.Clamp(albedo * (1 - 0.6 * pinhole), 0.03, 0.95);
    }
}
