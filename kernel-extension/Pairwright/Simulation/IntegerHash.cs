namespace Pairwright.Simulation;

/// <summary>Random numbers that depend on where they are asked for, not on the order of asking: the same on any number of threads and any machine.</summary>
/// <remarks>The finaliser of SplitMix (Steele, Lea and Flood 2014, "Fast splittable pseudorandom number generators"), in integer arithmetic.</remarks>
internal static class IntegerHash
{
    /// <summary>Sixty-four well mixed bits.</summary>
    public static ulong Mix(ulong value)
    {
        value = (value ^ (value >> 30)) * 0xBF58476D1CE4E5B9UL;
        value = (value ^ (value >> 27)) * 0x94D049BB133111EBUL;
        return value ^ (value >> 31);
    }

    /// <summary>Well mixed bits of a lattice point and a seed.</summary>
    public static ulong At(long x, long y, ulong seed) =>
        Mix(seed + (ulong)x * 0x9E3779B97F4A7C15UL + (ulong)y * 0xD1B54A32D192ED03UL);

    /// <summary>A number in [0, 1) from the upper 53 bits.</summary>
    public static double Unit(ulong bits) => (bits >> 11) * (1.0 / (1UL << 53));

    /// <summary>A seed of its own for a part of something seeded.</summary>
    public static ulong Part(long seed, long part) => Mix(Mix((ulong)seed + 0x9E3779B97F4A7C15UL) + (ulong)part * 0xD1B54A32D192ED03UL);
}
