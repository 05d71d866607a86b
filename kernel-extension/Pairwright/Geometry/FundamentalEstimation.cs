using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>What a fundamental matrix was estimated from, and how well it fits.</summary>
/// <param name="Matches">All matches that were given.</param>
/// <param name="Consistent">For each match whether it was used at the end.</param>
/// <param name="SampsonDistancesPx">For each match its signed Sampson distance, in pixels.</param>
/// <param name="TolerancePx">The Sampson distance up to which a match counted as consistent, in pixels; infinite where all were used.</param>
/// <param name="Samples">How many random samples were drawn; zero where none were.</param>
/// <param name="Seed">The seed of the random samples.</param>
public sealed record FundamentalEstimation(
    ImmutableArray<IdealMatch> Matches,
    ImmutableArray<bool> Consistent,
    ImmutableArray<double> SampsonDistancesPx,
    double TolerancePx,
    int Samples,
    int Seed)
{
    /// <summary>How many matches were used at the end.</summary>
    public int ConsistentCount => Consistent.Count(used => used);

    /// <summary>The share of matches that were used at the end, 0 to 1.</summary>
    public double ConsistentShare => ConsistentCount / (double)Matches.Length;

    /// <summary>The root mean square of the Sampson distances of the matches that were used, in pixels.</summary>
    public double SampsonRmsPx =>
        Math.Sqrt(SampsonDistancesPx.Where((_, i) => Consistent[i]).Select(distance => distance * distance).DefaultIfEmpty(double.NaN).Average());

    /// <summary>
    /// The standard deviation of a pixel coordinate that explains the residuals, in pixels: the sum of squares over the number of matches
    /// used less the seven parameters; NaN for seven matches or fewer.
    /// </summary>
    public double SigmaPx => ConsistentCount > 7 ? SampsonRmsPx * Math.Sqrt(ConsistentCount / (ConsistentCount - 7.0)) : double.NaN;
}
