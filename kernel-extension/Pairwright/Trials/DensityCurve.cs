using System.Globalization;
using Pairwright.Matching;

namespace Pairwright.Trials;

/// <summary>The share of wrong pixels among the most confident ones, against how many are taken in.</summary>
/// <remarks>
/// Hu and Mordohai, A quantitative evaluation of confidence measures for stereo vision, PAMI 2012, section 5. Pixels without a disparity come
/// last and count as wrong, so that curves of maps with gaps can be compared. Among pixels of one confidence, wrong ones are taken as spread evenly. Immutable.
/// </remarks>
public sealed class DensityCurve
{
    private readonly double[] densities;
    private readonly double[] wrong;
    private readonly int pixels;

    // Densities and wrong pixels at the end of each group of one confidence.
    private DensityCurve(double boundPx, int pixels, double[] densities, double[] wrong, double matchedShare)
    {
        (BoundPx, this.pixels, this.densities, this.wrong, MatchedShare) = (boundPx, pixels, densities, wrong, matchedShare);
        Area = Integral();
        var share = pixels == 0 ? double.NaN : wrong[^1] / pixels;
        OptimalArea = share >= 1 ? 1 : share + (1 - share) * Math.Log(1 - share);
    }

    /// <summary>A pixel is wrong beyond this, in pixels.</summary>
    public double BoundPx { get; }

    /// <summary>The density at which pixels with a disparity end, 0 to 1.</summary>
    public double MatchedShare { get; }

    /// <summary>The area under the curve from density 0 to 1: the mean share of wrong pixels; the lower the better.</summary>
    public double Area { get; }

    /// <summary>The least area that any confidence could give to the same disparities: all right ones first, ε + (1 − ε)·ln(1 − ε) (Hu and Mordohai 2012, equation 23).</summary>
    public double OptimalArea { get; }

    /// <summary>The curve at every hundredth of density.</summary>
    public IReadOnlyList<DensityPoint> Points => [.. Enumerable.Range(1, 100).Select(i => new DensityPoint(i / 100.0, WrongShareAt(i / 100.0)))];

    /// <summary>The share of wrong pixels among the most confident ones.</summary>
    /// <param name="density">The share of pixels taken in, above 0, at most 1.</param>
    /// <returns>NaN for an empty region or a density outside.</returns>
    public double WrongShareAt(double density)
    {
        if (!(density > 0 && density <= 1) || pixels == 0)
        {
            return double.NaN;
        }

        var index = Array.BinarySearch(densities, density);
        if (index >= 0)
        {
            return wrong[index] / (density * pixels);
        }

        var after = Math.Min(~index, densities.Length - 1);
        var (d0, w0) = after == 0 ? (0, 0) : (densities[after - 1], wrong[after - 1]);
        var part = (density - d0) / (densities[after] - d0);
        return (w0 + Math.Min(part, 1) * (wrong[after] - w0)) / (density * pixels);
    }

    /// <summary>The bound and the area in a line.</summary>
    public override string ToString() => string.Create(
        CultureInfo.InvariantCulture, $"Error against density: > {BoundPx:0.##} px, area {Area:0.0000} (at best {OptimalArea:0.0000}), {MatchedShare:0.0%} matched");

    internal static DensityCurve Of(DisparityAccuracy accuracy, double boundPx, TruthRegion region)
    {
        var (map, truth) = (accuracy.Map, accuracy.Truth);
        if (!(boundPx >= truth.ResolutionPx))
        {
            throw new UserErrorException(string.Create(
                CultureInfo.InvariantCulture, $"Errors beyond {boundPx} px cannot be judged by a truth in steps of {truth.ResolutionPx} px; give a bound of at least one step."));
        }

        var mask = truth.Region(region, map.Pair.Left).Usable;
        var (confidences, isWrong, total) = (new List<float>(), new List<bool>(), 0);
        for (var i = 0; i < mask.Length; i++)
        {
            total += mask[i] ? 1 : 0;
            var error = mask[i] ? accuracy.ErrorAt(i) : float.NaN;
            if (!float.IsNaN(error))
            {
                // A filled disparity was never measured, whatever confidence the match had that it stands in for: it comes after all others.
                var confidence = map.Labels.Labels[i] == DisparityLabel.Filled ? float.NaN : map.Confidence.Values[i];
                confidences.Add(float.IsNaN(confidence) ? float.PositiveInfinity : -confidence);
                isWrong.Add(Math.Abs(error) > boundPx);
            }
        }

        return Of(boundPx, [.. confidences], [.. isWrong], total);
    }

    // Keys grow as confidence falls.
    private static DensityCurve Of(double boundPx, float[] keys, bool[] isWrong, int total)
    {
        Array.Sort(keys, isWrong);
        var (densities, wrong, sum) = (new List<double>(), new List<double>(), 0);
        for (var i = 0; i < keys.Length; i++)
        {
            sum += isWrong[i] ? 1 : 0;
            if (i + 1 == keys.Length || keys[i + 1] != keys[i])
            {
                densities.Add((i + 1.0) / total);
                wrong.Add(sum);
            }
        }

        if (keys.Length < total)
        {
            densities.Add(1);
            wrong.Add(sum + total - keys.Length);
        }

        return new(boundPx, total, [.. densities], [.. wrong], total == 0 ? double.NaN : (double)keys.Length / total);
    }

    // Within a group wrong pixels grow in proportion: w(x) = a + b·x, so that the share is a / x + b.
    private double Integral()
    {
        var (area, d0, w0) = (0.0, 0.0, 0.0);
        for (var i = 0; i < densities.Length; i++)
        {
            var (d1, w1) = (densities[i], wrong[i] / pixels);
            var slope = (w1 - w0) / (d1 - d0);
            var start = w0 - slope * d0;
            area += slope * (d1 - d0) + (d0 > 0 ? start * Math.Log(d1 / d0) : 0);
            (d0, w0) = (d1, w1);
        }

        return pixels == 0 ? double.NaN : area;
    }
}
