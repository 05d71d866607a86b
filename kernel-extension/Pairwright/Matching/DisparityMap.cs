using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The disparity of each pixel of the left rectified picture, with what became of those that have none.</summary>
/// <remarks>d = u_left − u_right, in pixels; NaN where there is none. Immutable.</remarks>
public sealed class DisparityMap
{
    internal DisparityMap(
        RectifiedPair pair,
        Recipe recipe,
        ScalarMap disparity,
        ScalarMap confidence,
        LabelMap labels,
        TimeSpan elapsed,
        Provenance provenance,
        ScalarMap? sigma = null,
        RowOffset? rowOffset = null)
    {
        (Pair, Recipe, Disparity, Confidence, Labels, Elapsed, Provenance, Sigma, RowOffset) = (pair, recipe, disparity, confidence, labels, elapsed, provenance, sigma, rowOffset);
    }

    /// <summary>The pair that was matched.</summary>
    public RectifiedPair Pair { get; }

    /// <summary>How it was matched.</summary>
    public Recipe Recipe { get; }

    /// <summary>The disparities that were searched.</summary>
    public DisparityRange Range => Recipe.Range;

    /// <summary>The size.</summary>
    public PictureSize Size => Disparity.Size;

    /// <summary>Disparities in pixels; NaN where there is none.</summary>
    public ScalarMap Disparity { get; }

    /// <summary>The standard uncertainty of each disparity's random part, in pixels, NaN where it is not known; nothing where none was estimated.</summary>
    public ScalarMap? Sigma { get; }

    /// <summary>
    /// How sure each match is, 0 to 1, by the recipe's measure, those that were refused included; NaN where nothing could be compared. It orders
    /// matches; a probability it is only where a filter of the recipe makes it one.
    /// </summary>
    public ScalarMap Confidence { get; }

    /// <summary>What became of each pixel.</summary>
    public LabelMap Labels { get; }

    /// <summary>How long the match took.</summary>
    public TimeSpan Elapsed { get; }

    /// <summary>Where it came from.</summary>
    public Provenance Provenance { get; }

    /// <summary>By how much matches miss their common row, where a stage estimated it: what today's pictures say of the rows of the calibration.</summary>
    public RowOffset? RowOffset { get; }

    /// <summary>The share of usable pixels whose disparity was measured, 0 to 1.</summary>
    public double MatchedShare => ShareOfUsable(DisparityLabel.Measured);

    /// <summary>The share of usable pixels whose best match stood at an end of what could be searched, 0 to 1.</summary>
    public double RangeEndShare => ShareOfUsable(DisparityLabel.RangeEnd);

    /// <summary>
    /// An upper bound, in pixels, of the distance at which the errors of two disparities are still correlated, because their costs share window
    /// content, their paths share costs, and filters share values. Pixels nearer than this are not independent.
    /// </summary>
    public int CorrelationLengthPx => Recipe.CorrelationLengthPx;

    /// <summary>The same map with another standard uncertainty per pixel.</summary>
    /// <param name="sigma">In pixels, NaN where it is not known; of the map's size.</param>
    /// <exception cref="UserErrorException">The size differs.</exception>
    public DisparityMap WithSigma(ScalarMap sigma)
    {
        ArgumentNullException.ThrowIfNull(sigma);
        if (sigma.Size != Size)
        {
            throw new UserErrorException($"A map of uncertainty of {sigma.Size} px does not fit a disparity map of {Size} px; give one of its own size.");
        }

        return new(Pair, Recipe, Disparity, Confidence, Labels, Elapsed, Provenance, sigma, RowOffset);
    }

    /// <summary>A disparity map whose values come from elsewhere, such as the truth of a simulated capture.</summary>
    /// <param name="pair">The pair that it belongs to.</param>
    /// <param name="disparity">Disparities in pixels, NaN where there is none; of the pair's size.</param>
    /// <param name="source">Where the values come from, in a few words, for the provenance.</param>
    /// <param name="confidence">How sure each value is, 0 to 1; 1 for every value when left out.</param>
    /// <remarks>The range reaches from the least to the greatest value; every value counts as measured.</remarks>
    /// <exception cref="UserErrorException">The sizes differ.</exception>
    public static DisparityMap FromValues(RectifiedPair pair, ScalarMap disparity, string source, ScalarMap? confidence = null)
    {
        ArgumentNullException.ThrowIfNull(pair);
        ArgumentNullException.ThrowIfNull(disparity);
        if (disparity.Size != pair.Size)
        {
            throw new UserErrorException($"A disparity map of {disparity.Size} px does not fit pictures of {pair.Size} px; give one of their size.");
        }

        if (confidence is not null && confidence.Size != pair.Size)
        {
            throw new UserErrorException($"A map of confidence of {confidence.Size} px does not fit pictures of {pair.Size} px; give one of their size.");
        }

        var (least, most) = (0f, 0f);
        var labels = new DisparityLabel[disparity.Size.Area];
        for (var i = 0; i < labels.Length; i++)
        {
            var value = disparity.Values[i];
            labels[i] = float.IsNaN(value) ? DisparityLabel.NoMatch : DisparityLabel.Measured;
            (least, most) = float.IsNaN(value) ? (least, most) : (Math.Min(least, value), Math.Max(most, value));
        }

        return new(
            pair,
            Recipe.For(new DisparityRange((int)Math.Floor(least), (int)Math.Ceiling(most))),
            disparity,
            confidence ?? disparity.Select(value => float.IsNaN(value) ? float.NaN : 1),
            new LabelMap(disparity.Size, labels),
            TimeSpan.Zero,
            pair.Provenance.Then("disparity from elsewhere", source));
    }

    private double ShareOfUsable(DisparityLabel label)
    {
        var usable = 1 - Labels.Share(DisparityLabel.Unusable);
        return usable > 0 ? Labels.Share(label) / usable : 0;
    }
}
