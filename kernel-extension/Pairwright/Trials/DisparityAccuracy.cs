using Pairwright.Matching;

namespace Pairwright.Trials;

/// <summary>How near a disparity map comes to the truth, region by region, and how well its confidence tells right from wrong.</summary>
/// <remarks>Immutable.</remarks>
public sealed class DisparityAccuracy
{
    private readonly RegionAccuracy[] regions;

    private DisparityAccuracy(DisparityMap map, DisparityTruth truth, bool withFilled)
    {
        (Map, Truth, WithFilled) = (map, truth, withFilled);
        regions = [.. Enum.GetValues<TruthRegion>().Select(region => Of(region, map, truth, withFilled))];
    }

    /// <summary>The map that was judged.</summary>
    public DisparityMap Map { get; }

    /// <summary>The truth.</summary>
    public DisparityTruth Truth { get; }

    /// <summary>Whether filled values were judged as well as measured ones.</summary>
    public bool WithFilled { get; }

    /// <summary>The accuracy over a region.</summary>
    public RegionAccuracy this[TruthRegion region] => regions[(int)region];

    /// <summary>All regions.</summary>
    public IReadOnlyList<RegionAccuracy> Regions => regions;

    /// <summary>Judges a map.</summary>
    /// <param name="map">The map.</param>
    /// <param name="truth">The truth, of the map's size.</param>
    /// <param name="withFilled">Whether values that were filled in count as well as those that were measured.</param>
    /// <exception cref="UserErrorException">The sizes differ.</exception>
    public static DisparityAccuracy Of(DisparityMap map, DisparityTruth truth, bool withFilled = false)
    {
        ArgumentNullException.ThrowIfNull(map);
        ArgumentNullException.ThrowIfNull(truth);
        return new(map, truth, withFilled);
    }

    /// <summary>How the share of wrong pixels grows as less confident ones are taken in.</summary>
    /// <param name="boundPx">A pixel is wrong beyond this, in pixels; not below the truth's resolution.</param>
    /// <param name="region">The region.</param>
    /// <exception cref="UserErrorException">The bound is below the truth's resolution.</exception>
    public DensityCurve DensityCurve(double boundPx = 1, TruthRegion region = TruthRegion.All) => Trials.DensityCurve.Of(this, boundPx, region);

    /// <summary>All regions, one a line.</summary>
    public override string ToString() => string.Join("\n", Regions);

    // The error of a pixel; NaN where it has no disparity or its truth is not known.
    internal float ErrorAt(int i) => ErrorAt(Map, Truth, WithFilled, i);

    private static float ErrorAt(DisparityMap map, DisparityTruth truth, bool withFilled, int i) =>
        map.Labels.Labels[i] == DisparityLabel.Measured || (withFilled && map.Labels.Labels[i] == DisparityLabel.Filled)
            ? map.Disparity.Values[i] - truth.Disparity.Values[i]
            : float.NaN;

    private static RegionAccuracy Of(TruthRegion region, DisparityMap map, DisparityTruth truth, bool withFilled)
    {
        var mask = truth.Region(region, map.Pair.Left).Usable;
        var (pixels, errors) = (0, new List<float>());
        for (var i = 0; i < mask.Length; i++)
        {
            if (!mask[i])
            {
                continue;
            }

            pixels++;
            var error = ErrorAt(map, truth, withFilled, i);
            if (!float.IsNaN(error))
            {
                errors.Add(error);
            }
        }

        return new(region, pixels, [.. errors], truth.ResolutionPx);
    }
}
