using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>Sawn softwood: the plank is cut out of a trunk whose pith runs, a little tilted, below it.</summary>
internal sealed class WoodTexture : Texture
{
    private const int KnotCount = 3;
    private const double RegionLength = 460;
    private const double RegionWidth = 150;

    private readonly ulong seed;
    private readonly double brightness;
    private readonly double pithY;
    private readonly double pithZ;
    private readonly double pithSlopeY;
    private readonly double pithSlopeZ;
    private readonly double ringMm;
    private readonly (double X, double Y, double Radius)[] knots;

    public WoodTexture(int seed, double brightness)
    {
        (this.seed, this.brightness) = (IntegerHash.Part(seed, 0), brightness);
        double Random(int part, double from, double to) => from + (to - from) * IntegerHash.Unit(IntegerHash.Part(seed, part));
        pithY = Random(1, -70, 70);
        pithZ = Random(2, -75, -25);
        pithSlopeY = Random(3, -0.03, 0.03);
        pithSlopeZ = Random(4, -0.07, 0.07);
        ringMm = Random(5, 3.2, 5.0);
        knots =
        [
            .. Enumerable.Range(0, KnotCount).Select(i => (
                Random(10 + 3 * i, -RegionLength / 2, RegionLength / 2),
                Random(11 + 3 * i, -RegionWidth / 2, RegionWidth / 2),
                Random(12 + 3 * i, 3.5, 8.5))),
        ];
    }

    public override double Albedo(Vector3D point)
    {
        var (x, y, z) = (point.X, point.Y, point.Z);
        var side = y + 1.3 * z;

        // Rings: distance from the pith, wavering along the trunk, bent around knots.
        var (dy, dz) = (y - pithY - pithSlopeY * x, z - pithZ - pithSlopeZ * x);
        var radius = Math.Sqrt(dy * dy + dz * dz) + 5 * LatticeNoise.Gradient(x / 160, side / 60, seed) + 1.2 * LatticeNoise.Gradient(x / 45, side / 14, seed + 1);
        var knotDarkness = 0.0;
        foreach (var knot in knots)
        {
            var (kx, ky) = ((x - knot.X) / knot.Radius, (y - knot.Y) / knot.Radius);
            var squared = 0.55 * kx * kx + ky * ky;
            if (squared < 30)
            {
                radius += 1.5 * knot.Radius * Math.Exp(-squared / 5);
                var distance = Math.Sqrt(squared) + 0.12 * LatticeNoise.Gradient(x / 3, y / 3, seed + 2);
                var core = 1 - LatticeNoise.Rise(0.85, 1.15, distance);
                var rim = LatticeNoise.Rise(0.6, 0.95, distance) * (1 - LatticeNoise.Rise(1.0, 1.35, distance));
                knotDarkness = Math.Max(knotDarkness, 0.34 * core * (1 + 0.2 * Math.Sin(14 * distance)) + 0.2 * rim);
            }
        }

        // Rings of a slow year are narrower; latewood darkens slowly and ends sharply.
        var rings = radius / ringMm;
        rings += 0.6 * LatticeNoise.Gradient(rings / 3.3, 0.5, seed + 3);
        var year = Math.Floor(rings);
        var season = rings - year;
        var strength = 0.6 + 0.4 * IntegerHash.Unit(IntegerHash.At((long)year, 0, seed + 4));
        var latewood = strength * LatticeNoise.Rise(0.35, 0.88, season) * (1 - LatticeNoise.Rise(0.9, 1.0, season));

        var fibres = LatticeNoise.Gradient(x / 34, side / 1.5, seed + 5) + 0.7 * LatticeNoise.Gradient(x / 11, side / 0.8, seed + 6);
        var sawMarks = LatticeNoise.Gradient((x + 0.0006 * y * y) / 2.8, y / 120, seed + 7);
        var fluff = LatticeNoise.Gradient(x / 2.2, side / 1.6, seed + 8);
        var stain = LatticeNoise.Octaves(x / 130, side / 70, 2, seed + 9);

        var albedo = 0.68 * (1 - 0.36 * latewood - knotDarkness) * (1 + 0.12 * fibres + 0.05 * sawMarks + 0.10 * fluff + 0.07 * stain);
        return Math.Clamp(brightness * albedo, 0.03, 0.97);
    }
}
