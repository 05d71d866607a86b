namespace Pairwright.Simulation;

/// <summary>How a camera turns light into grey levels: the linear model of EMVA Standard 1288 (release 4.0 Linear, section 2).</summary>
/// <remarks>
/// Photons arrive after Poisson's law; a share (the quantum efficiency) frees electrons, so that these are Poisson too; the dark noise adds
/// a Gaussian number of electrons; the system gain K turns electrons into digital numbers (DN), which are rounded and cut off at
/// saturation. Mean: μ = μ_dark + K·η·μ_p. Variance: σ² = K²·(σ_d² + μ_e) + 1/12.
/// </remarks>
public sealed record Sensor
{
    // Multiples of 2⁶⁴ over the golden ratio (Steele, Lea and Flood 2014) keep a pixel's random numbers apart.
    private const ulong FirstStream = 0x9E3779B97F4A7C15;
    private const ulong SecondStream = unchecked(2 * FirstStream);
    private const ulong ThirdStream = unchecked(3 * FirstStream);

    /// <summary>Makes a sensor.</summary>
    /// <param name="bits">Bits of the digital numbers, 8 to 16.</param>
    /// <param name="fullWellElectrons">The electrons at which the largest digital number is reached.</param>
    /// <param name="darkNoiseElectrons">Standard deviation of the dark signal, in electrons.</param>
    /// <param name="blackLevel">Mean dark level, in digital numbers.</param>
    /// <param name="quantumEfficiency">Electrons per photon, above 0, at most 1.</param>
    /// <exception cref="UserErrorException">A value is out of its range.</exception>
    public Sensor(int bits = 8, double fullWellElectrons = 10_000, double darkNoiseElectrons = 8, double blackLevel = 2, double quantumEfficiency = 0.6)
    {
        if (bits is < 8 or > 16)
        {
            throw new UserErrorException($"A sensor of {bits} bits is not supported; give 8 to 16.");
        }

        if (!(fullWellElectrons > 0 && darkNoiseElectrons >= 0 && blackLevel >= 0 && blackLevel < (1 << bits) - 1 && quantumEfficiency is > 0 and <= 1)
            || !double.IsFinite(fullWellElectrons + darkNoiseElectrons))
        {
            throw new UserErrorException(
                "A sensor needs a full well above zero, a dark noise and a black level of at least zero and a quantum efficiency above 0 and at most 1; correct them.");
        }

        (Bits, FullWellElectrons, DarkNoiseElectrons, BlackLevel, QuantumEfficiency) =
            (bits, fullWellElectrons, darkNoiseElectrons, blackLevel, quantumEfficiency);
    }

    /// <summary>Bits of the digital numbers.</summary>
    public int Bits { get; }

    /// <summary>The electrons at which the largest digital number is reached.</summary>
    public double FullWellElectrons { get; }

    /// <summary>Standard deviation σ_d of the dark signal, in electrons.</summary>
    public double DarkNoiseElectrons { get; }

    /// <summary>Mean dark level μ_dark, in digital numbers.</summary>
    public double BlackLevel { get; }

    /// <summary>Quantum efficiency η, electrons per photon.</summary>
    public double QuantumEfficiency { get; }

    /// <summary>The largest digital number.</summary>
    public int LargestLevel => (1 << Bits) - 1;

    /// <summary>System gain K, in digital numbers per electron.</summary>
    public double SystemGain => (LargestLevel - BlackLevel) / FullWellElectrons;

    /// <summary>Photons per pixel that just reach the largest digital number.</summary>
    public double SaturationPhotons => FullWellElectrons / QuantumEfficiency;

    /// <summary>The digital number of a pixel that a mean number of photons falls on.</summary>
    /// <param name="meanPhotons">The mean number of photons in the exposure.</param>
    /// <param name="pixelSeed">Well mixed bits that belong to this pixel of this exposure alone.</param>
    internal ushort Expose(double meanPhotons, ulong pixelSeed)
    {
        var meanElectrons = QuantumEfficiency * meanPhotons;
        var first = IntegerHash.Mix(pixelSeed + FirstStream);
        var second = IntegerHash.Mix(pixelSeed + SecondStream);

        // One pair of uniform numbers makes two independent normal ones (Box and Muller 1958).
        var radius = Math.Sqrt(-2 * Math.Log(1 - IntegerHash.Unit(first)));
        var (sine, cosine) = Math.SinCos(2 * Math.PI * IntegerHash.Unit(second));
        var electrons = ShotElectrons(meanElectrons, radius * cosine, pixelSeed) + DarkNoiseElectrons * radius * sine;
        return (ushort)Math.Clamp(Math.Floor(BlackLevel + SystemGain * electrons + 0.5), 0, LargestLevel);
    }

    private static double ShotElectrons(double mean, double normal, ulong pixelSeed)
    {
        // Above fifty electrons the first two terms of Cornish and Fisher (1938) have Poisson's mean and skewness and, but for 1/18
        // of an electron squared, its variance; that the number is whole is lost under the dark noise.
        if (mean > 50)
        {
            return mean + Math.Sqrt(mean) * normal + (normal * normal - 1) / 6;
        }

        var uniform = IntegerHash.Unit(IntegerHash.Mix(pixelSeed + ThirdStream));
        var (count, term) = (0, Math.Exp(-mean));
        var sum = term;
        while (uniform > sum && count < 400)
        {
            term *= mean / ++count;
            sum += term;
        }

        return count;
    }
}
