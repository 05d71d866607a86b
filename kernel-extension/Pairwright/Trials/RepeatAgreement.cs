using System.Globalization;
using Pairwright.Imaging;
using Pairwright.Matching;

namespace Pairwright.Trials;

/// <summary>How well disparity maps of one scene taken several times agree: a figure that needs no truth.</summary>
/// <remarks>
/// It shows the random part of the error, what noise does, and nothing of what repeats itself: a wrong match that is wrong the same way every time agrees perfectly. Immutable.
/// </remarks>
public sealed class RepeatAgreement
{
    private RepeatAgreement(int repeats, int alwaysMeasured, int sometimesMeasured, ScalarMap deviation, double pooled, double median) =>
        (Repeats, AlwaysMeasured, SometimesMeasured, DeviationPx, PooledDeviationPx, MedianDeviationPx) =
            (repeats, alwaysMeasured, sometimesMeasured, deviation, pooled, median);

    /// <summary>How many maps there are.</summary>
    public int Repeats { get; }

    /// <summary>How many pixels were measured in every map.</summary>
    public int AlwaysMeasured { get; }

    /// <summary>How many were measured in some maps and not in others.</summary>
    public int SometimesMeasured { get; }

    /// <summary>The experimental standard deviation per pixel over the repeats, in pixels; NaN where not every map measured it.</summary>
    public ScalarMap DeviationPx { get; }

    /// <summary>The pooled standard deviation of a single disparity, in pixels: the root of the mean variance; NaN where no pixel was always measured.</summary>
    public double PooledDeviationPx { get; }

    /// <summary>The median of the pixels' standard deviations, in pixels, which a few jumping matches do not move; NaN where no pixel was always measured.</summary>
    public double MedianDeviationPx { get; }

    /// <summary>Compares maps of one scene.</summary>
    /// <param name="maps">At least two, of one size.</param>
    /// <exception cref="UserErrorException">There are fewer than two, or the sizes differ.</exception>
    public static RepeatAgreement Of(IReadOnlyList<DisparityMap> maps)
    {
        ArgumentNullException.ThrowIfNull(maps);
        if (maps.Count < 2)
        {
            throw new UserErrorException($"Agreement of repeats takes at least two maps of one scene, not {maps.Count}; give more.");
        }

        if (maps.FirstOrDefault(map => map.Size != maps[0].Size) is { } other)
        {
            throw new UserErrorException($"Repeats must have one size, but one map is {maps[0].Size} px and another {other.Size} px; give captures of one camera.");
        }

        var (always, sometimes, variances) = (0, 0, 0.0);
        var deviations = new List<float>();
        var map = ScalarMap.From(maps[0].Size, (u, v) =>
        {
            var (count, sum) = (0, 0.0);
            foreach (var each in maps)
            {
                if (each.Labels[u, v] == DisparityLabel.Measured)
                {
                    (count, sum) = (count + 1, sum + each.Disparity[u, v]);
                }
            }

            if (count < maps.Count)
            {
                sometimes += count > 0 ? 1 : 0;
                return float.NaN;
            }

            always++;
            var mean = sum / count;
            var variance = maps.Sum(each => (each.Disparity[u, v] - mean) * (each.Disparity[u, v] - mean)) / (count - 1);
            variances += variance;
            deviations.Add((float)Math.Sqrt(variance));
            return deviations[^1];
        });
        deviations.Sort();
        return new(maps.Count, always, sometimes, map, Math.Sqrt(variances / always), always == 0 ? double.NaN : deviations[(always - 1) / 2]);
    }

    /// <summary>The main figures in a line.</summary>
    public override string ToString() => string.Create(
        CultureInfo.InvariantCulture,
        $"{Repeats} repeats: {AlwaysMeasured} px always measured, {SometimesMeasured} px sometimes; standard deviation {PooledDeviationPx:0.000} px pooled, {MedianDeviationPx:0.000} px in the median");
}
