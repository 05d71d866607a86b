using System.Globalization;
using Pairwright.Imaging;
using Pairwright.Matching;

namespace Pairwright.Trials;

/// <summary>How well the match from the left picture to the right agrees with one made the other way round: a figure that needs no truth.</summary>
/// <remarks>
/// The recipe is run once more on the mirrored pair with the right picture as the reference, not read off the first match. Agreement is
/// necessary, not sufficient: both ways can be wrong alike, as on a repeating pattern. Immutable.
/// </remarks>
public sealed class LeftRightAgreement
{
    private readonly float[] sorted;

    private LeftRightAgreement(DisparityMap left, int matched, List<float> differences)
    {
        (Left, Matched, Compared) = (left, matched, differences.Count);
        sorted = [.. differences];
        Array.Sort(sorted);
        RmsPx = Math.Sqrt(sorted.Sum(difference => (double)difference * difference) / Compared);
    }

    /// <summary>The map from left to right.</summary>
    public DisparityMap Left { get; }

    /// <summary>How many pixels of the left picture were measured.</summary>
    public int Matched { get; }

    /// <summary>How many of these land where the right picture was measured too.</summary>
    public int Compared { get; }

    /// <summary>The root mean square of the two disparities' differences, in pixels; NaN where nothing was compared.</summary>
    public double RmsPx { get; }

    /// <summary>The magnitude of difference, in pixels, that half of the compared pixels do not exceed; NaN where nothing was compared.</summary>
    public double MedianPx => Compared == 0 ? double.NaN : sorted[(Compared - 1) / 2];

    /// <summary>The share of the measured pixels whose match the other way differs by at most a bound, 0 to 1; those without one count as disagreeing.</summary>
    /// <param name="boundPx">The bound, in pixels.</param>
    public double ShareWithin(double boundPx) => sorted.Count(difference => difference <= boundPx) / (double)Matched;

    /// <summary>Matches a pair both ways.</summary>
    /// <param name="pair">The pair.</param>
    /// <param name="recipe">The recipe.</param>
    /// <param name="stop">Asks to stop.</param>
    /// <exception cref="UserErrorException">The recipe does not fit the pictures.</exception>
    /// <exception cref="OperationCanceledException">It was asked to stop.</exception>
    public static LeftRightAgreement Of(RectifiedPair pair, Recipe recipe, CancellationToken stop = default)
    {
        ArgumentNullException.ThrowIfNull(pair);
        ArgumentNullException.ThrowIfNull(recipe);
        var left = pair.Match(recipe, stop);

        // Mirrored and swapped, the right picture is a left one with the same disparities.
        var mirrored = new RectifiedPair(Mirrored(pair.Right), Mirrored(pair.Left)).Match(recipe, stop);
        var (width, matched, differences) = (pair.Size.Width, 0, new List<float>());
        for (var v = 0; v < pair.Size.Height; v++)
        {
            for (var u = 0; u < width; u++)
            {
                if (left.Labels[u, v] != DisparityLabel.Measured)
                {
                    continue;
                }

                matched++;
                var there = width - 1 - (int)Math.Round(u - left.Disparity[u, v]);
                if (there >= 0 && there < width && mirrored.Labels[there, v] == DisparityLabel.Measured)
                {
                    differences.Add(Math.Abs(left.Disparity[u, v] - mirrored.Disparity[there, v]));
                }
            }
        }

        return new(left, matched, differences);
    }

    /// <summary>The main figures in a line.</summary>
    public override string ToString() => string.Create(
        CultureInfo.InvariantCulture, $"Left-right: {ShareWithin(1):0.0%} of {Matched} measured px agree within 1 px; median difference {MedianPx:0.000} px");

    private static Picture Mirrored(Picture picture)
    {
        var (width, height) = (picture.Size.Width, picture.Size.Height);
        var grey = picture.Grey.ToArray();
        for (var v = 0; v < height; v++)
        {
            Array.Reverse(grey, v * width, width);
        }

        var usable = picture.Usable is { } mask ? Mask.From(picture.Size, (u, v) => mask[width - 1 - u, v]) : null;
        return new(picture.Size, grey, picture.SignificantBits, picture.SaturationLevel, usable: usable, provenance: picture.Provenance.Then("mirror"));
    }
}
