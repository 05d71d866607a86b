using System.Globalization;

namespace Pairwright.Trials;

/// <summary>How near the disparities of one region come to the truth.</summary>
/// <remarks>An error is the map's disparity less the true one, in pixels. Immutable.</remarks>
public sealed class RegionAccuracy
{
    private readonly float[] sortedAbsolute;
    private readonly double resolutionPx;

    internal RegionAccuracy(TruthRegion region, int pixels, float[] errors, double resolutionPx)
    {
        (Region, Pixels, Matched, this.resolutionPx) = (region, pixels, errors.Length, resolutionPx);
        var (sum, absolute, squares) = (0.0, 0.0, 0.0);
        foreach (var error in errors)
        {
            (sum, absolute, squares) = (sum + error, absolute + Math.Abs(error), squares + (double)error * error);
        }

        (MeanPx, MeanAbsolutePx, RmsPx) = (sum / Matched, absolute / Matched, Math.Sqrt(squares / Matched));
        sortedAbsolute = Array.ConvertAll(errors, Math.Abs);
        Array.Sort(sortedAbsolute);
    }

    /// <summary>The region.</summary>
    public TruthRegion Region { get; }

    /// <summary>How many of its pixels have a known truth.</summary>
    public int Pixels { get; }

    /// <summary>How many of these have a disparity.</summary>
    public int Matched { get; }

    /// <summary>The share of pixels that have a disparity, 0 to 1; NaN for an empty region.</summary>
    public double MatchedShare => (double)Matched / Pixels;

    /// <summary>The mean error in pixels; NaN where nothing matched.</summary>
    public double MeanPx { get; }

    /// <summary>The mean of the errors' magnitudes in pixels; NaN where nothing matched.</summary>
    public double MeanAbsolutePx { get; }

    /// <summary>The root mean square of the errors in pixels; NaN where nothing matched.</summary>
    public double RmsPx { get; }

    /// <summary>The share of matched pixels that are wrong by strictly more than a bound, 0 to 1.</summary>
    /// <param name="boundPx">The bound, in pixels.</param>
    /// <returns>NaN where nothing matched, or where the truth is coarser than the bound and cannot judge it.</returns>
    public double ShareBeyond(double boundPx) => Beyond(boundPx) / Matched;

    /// <summary>The share of all pixels that are wrong by strictly more than a bound or have no disparity, 0 to 1.</summary>
    /// <param name="boundPx">The bound, in pixels.</param>
    /// <returns>NaN for an empty region, or where the truth is coarser than the bound and cannot judge it.</returns>
    public double ShareBeyondOrMissing(double boundPx) => (Beyond(boundPx) + Pixels - Matched) / Pixels;

    /// <summary>The magnitude, in pixels, that a share of the matched pixels' errors do not exceed; NaN where nothing matched.</summary>
    /// <param name="share">0 to 1; 0.5 for the median.</param>
    public double Quantile(double share) =>
        Matched == 0 || double.IsNaN(share) ? double.NaN : sortedAbsolute[(int)Math.Round(Math.Clamp(share, 0, 1) * (Matched - 1))];

    /// <summary>The main figures in a line.</summary>
    public override string ToString() => string.Create(
        CultureInfo.InvariantCulture,
        $"{Name()}: {MatchedShare:0.0%} of {Pixels} px matched; of these > 1 px {ShareBeyond(1):0.00%}, > 2 px {ShareBeyond(2):0.00%}; mean {MeanPx:0.000} px, RMS {RmsPx:0.000} px");

    private double Beyond(double boundPx)
    {
        if (!(boundPx >= resolutionPx))
        {
            return double.NaN;
        }

        // The first error above the bound, by halving.
        var (low, high) = (0, Matched);
        while (low < high)
        {
            var middle = (low + high) / 2;
            (low, high) = sortedAbsolute[middle] > boundPx ? (low, middle) : (middle + 1, high);
        }

        return Matched - low;
    }

    private string Name() => Region switch
    {
        TruthRegion.All => "all pixels",
        TruthRegion.Unoccluded => "seen by both",
        TruthRegion.NearDepthEdges => "near depth edges",
        _ => "plain",
    };
}
