namespace Pairwright.Measurement;

/// <summary>The distribution of an output quantity after random trials.</summary>
public sealed class MonteCarloResult
{
    private readonly double[] sorted;

    internal MonteCarloResult(double[] sorted)
    {
        this.sorted = sorted;
        Mean = sorted.Average();
        StandardUncertainty = Math.Sqrt(sorted.Sum(value => (value - Mean) * (value - Mean)) / (sorted.Length - 1));
    }

    /// <summary>The number of trials.</summary>
    public int Trials => sorted.Length;

    /// <summary>The mean of the trials: the best estimate (JCGM 101:2008, 7.6).</summary>
    public double Mean { get; }

    /// <summary>Their standard deviation: the standard uncertainty (JCGM 101:2008, 7.6).</summary>
    public double StandardUncertainty { get; }

    /// <summary>The value below which a share of the trials lies.</summary>
    /// <param name="share">From 0 to 1.</param>
    public double Quantile(double share) => sorted[(int)Math.Clamp(Math.Round(share * (sorted.Length - 1)), 0, sorted.Length - 1)];

    /// <summary>The interval with equal shares left out on either side (JCGM 101:2008, 7.7).</summary>
    /// <param name="probability">The share that it covers, between 0 and 1.</param>
    public (double Low, double High) SymmetricInterval(double probability = 0.95) => (Quantile((1 - probability) / 2), Quantile((1 + probability) / 2));

    /// <summary>The shortest interval that covers a share of the trials (JCGM 101:2008, 7.7 and 5.3.4).</summary>
    /// <param name="probability">The share that it covers, between 0 and 1.</param>
    public (double Low, double High) ShortestInterval(double probability = 0.95)
    {
        var covered = Math.Clamp((int)Math.Round(probability * sorted.Length), 1, sorted.Length - 1);
        var start = Enumerable.Range(0, sorted.Length - covered).MinBy(i => sorted[i + covered] - sorted[i]);
        return (sorted[start], sorted[start + covered]);
    }
}
