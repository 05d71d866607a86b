using Pairwright.Geometry;

namespace Pairwright.Simulation;

internal sealed class SpeckleTexture(double sizeMm, int seed, double dark, double light) : Texture
{
    private readonly ulong coarse = IntegerHash.Part(seed, 1);
    private readonly ulong fine = IntegerHash.Part(seed, 2);

    public override double Albedo(Vector3D point)
    {
        // Sheared by depth, so that walls along any axis are speckled too.
        var (x, y) = ((point.X + 0.83 * point.Z) / sizeMm, (point.Y + 0.61 * point.Z) / sizeMm);
        var value = LatticeNoise.Gradient(x, y, coarse) + 0.7 * LatticeNoise.Gradient(2.5 * x, 2.5 * y, fine);
        return dark + (light - dark) * LatticeNoise.Rise(-0.45, 0.45, value);
    }
}
