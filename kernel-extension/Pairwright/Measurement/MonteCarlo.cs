namespace Pairwright.Measurement;

/// <summary>Propagation of distributions by random trials (JCGM 101:2008), where the law of propagation is in doubt.</summary>
public static class MonteCarlo
{
    /// <summary>Runs a model many times on random inputs.</summary>
    /// <param name="model">Draws its inputs from the random source it is given and returns the output quantity.</param>
    /// <param name="trials">How many times, at least 100; 10⁶ gives a 95 % interval about two significant digits (JCGM 101:2008, 7.2.2).</param>
    /// <param name="seed">The same seed gives the same result.</param>
    /// <exception cref="ArgumentOutOfRangeException">Fewer than 100 trials.</exception>
    public static MonteCarloResult Propagate(Func<MonteCarloDraw, double> model, int trials = 200_000, int seed = 1)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentOutOfRangeException.ThrowIfLessThan(trials, 100);
        var draw = new MonteCarloDraw(seed);
        var outputs = new double[trials];
        for (var trial = 0; trial < trials; trial++)
        {
            outputs[trial] = model(draw);
        }

        Array.Sort(outputs);
        return new(outputs);
    }
}
