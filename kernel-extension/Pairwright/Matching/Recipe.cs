using System.Collections.Immutable;
using System.Security.Cryptography;
using System.Text;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>How to match a rectified pair: cost → aggregation → optimisation → sub-pixel → checks → filters, over a range of disparities.</summary>
/// <remarks>Immutable; equal when the range and all stages are equal. Change one part with <c>recipe with { Cost = … }</c>.</remarks>
public sealed record Recipe
{
    private Recipe(DisparityRange range) => Range = range;

    /// <summary>The disparities to search.</summary>
    public DisparityRange Range { get; init; }

    /// <summary>How unlike two pixels are; census over 9 × 7 pixels unless said otherwise.</summary>
    public Cost Cost { get; init; } = Cost.Census(9, 7);

    /// <summary>How costs are summed over a neighbourhood; not at all unless said otherwise.</summary>
    public Aggregation Aggregation { get; init; } = Aggregation.None;

    /// <summary>How one disparity per pixel is chosen; semi-global over eight paths unless said otherwise.</summary>
    public Optimisation Optimisation { get; init; } = Optimisation.SemiGlobal();

    /// <summary>Where between whole disparities the match lies; parabola unless said otherwise.</summary>
    public SubPixel SubPixel { get; init; } = SubPixel.Parabola;

    /// <summary>What each match must pass, in order; uniqueness and left-right unless said otherwise.</summary>
    public ImmutableArray<Check> Checks { get; init; } = [Check.Uniqueness(), Check.LeftRight()];

    /// <summary>How sure a match is; by its peak ratio unless said otherwise.</summary>
    public Confidence Confidence { get; init; } = Confidence.PeakRatio;

    /// <summary>What passes over the whole map, in order; speckle removal, median and least squares unless said otherwise.</summary>
    public ImmutableArray<Filter> Filters { get; init; } = [Filter.Speckle(), Filter.Median, Filter.LeastSquares()];

    /// <summary>The stages in the order in which they work.</summary>
    public IReadOnlyList<Stage> Stages => [Cost, Aggregation, Optimisation, SubPixel, .. Checks, Confidence, .. Filters];

    /// <summary>A short name that tells recipes apart: eight hexadecimal digits of a hash over the range and all stages.</summary>
    public string Id => Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(ToString())))[..8];

    /// <summary>
    /// An upper bound, in pixels, of the distance at which the errors of two disparities are still correlated: twice the cost's window, since two
    /// windows share content up to one window's side, and paths and filters reach about as far again; or what the last filter that measures anew says.
    /// </summary>
    public int CorrelationLengthPx => Filters.Select(filter => filter.CorrelationLengthPx).LastOrDefault(length => length is not null) ?? 2 * Cost.SupportPx;

    /// <summary>
    /// The standard uncertainty, in pixels, of the pull of disparities towards or away from whole pixels: an error that all pixels of a surface at
    /// one depth share, so that no number of them averages it away.
    /// </summary>
    public double PullSigmaPx => Filters.Select(filter => filter.PullSigmaPx).LastOrDefault(pull => pull is not null) ?? SubPixel.PullSigmaPx;

    /// <summary>The usual recipe over a range of disparities.</summary>
    public static Recipe For(DisparityRange range) => new(range);

    /// <summary>The usual recipe, with the range that a rectified pair's geometry and the working distance call for.</summary>
    /// <param name="geometry">The rectified geometry.</param>
    /// <param name="nearestMm">The nearest depth along the rectified axis, in millimetres, above zero.</param>
    /// <param name="farthestMm">The farthest depth, in millimetres, above the nearest; may be infinite.</param>
    /// <remarks>Two pixels are added at either end, so that a surface at the working distance's limit is not taken for an end of the range.</remarks>
    /// <exception cref="UserErrorException">The depths are not in order.</exception>
    public static Recipe For(RectifiedGeometry geometry, double nearestMm, double farthestMm)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        if (!(nearestMm > 0 && farthestMm > nearestMm))
        {
            throw new UserErrorException(
                $"Working distances from {nearestMm} mm to {farthestMm} mm are not in order; give the nearest, above zero, and then a larger farthest.");
        }

        var least = Math.Floor(geometry.Disparity(farthestMm)) - EndMarginPx;
        var most = Math.Ceiling(geometry.Disparity(nearestMm)) + EndMarginPx;
        if (most > int.MaxValue || least < int.MinValue)
        {
            throw new UserErrorException($"A nearest working distance of {nearestMm} mm calls for {most:0} px of disparity; give a larger one.");
        }

        return For(new DisparityRange((int)least, (int)most));
    }

    /// <summary>The usual recipe, with the range that a rig and the working distance call for when its captures are rectified as usual.</summary>
    /// <param name="rig">The rig.</param>
    /// <param name="nearestMm">The nearest depth along the rectified axis, in millimetres, above zero.</param>
    /// <param name="farthestMm">The farthest depth, in millimetres, above the nearest; may be infinite.</param>
    /// <remarks>
    /// The range is that of <see cref="StereoPair.Rectify(RectificationFit, PictureSize?)"/> without arguments; for another rectification, give
    /// its geometry instead.
    /// </remarks>
    /// <exception cref="UserErrorException">The depths are not in order, or the rig cannot be rectified.</exception>
    public static Recipe For(Rig rig, double nearestMm, double farthestMm)
    {
        ArgumentNullException.ThrowIfNull(rig);
        return For(Rectification.Of(rig).Geometry, nearestMm, farthestMm);
    }

    private const int EndMarginPx = 2;

    /// <summary>What differs between two recipes, one line per part, such as <c>cost: census (width 9, height 7) → zncc (window 11)</c>; empty for equal ones.</summary>
    public IReadOnlyList<string> DifferenceTo(Recipe other)
    {
        ArgumentNullException.ThrowIfNull(other);
        return [.. Parts().Zip(other.Parts()).Where(pair => pair.First != pair.Second).Select(pair => $"{pair.First.Part}: {pair.First.Text} → {pair.Second.Text}")];
    }

    /// <summary>Compares the range and all stages.</summary>
    public bool Equals(Recipe? other) =>
        other is not null && Range == other.Range && Checks.Length == other.Checks.Length && Stages.SequenceEqual(other.Stages);

    /// <inheritdoc/>
    public override int GetHashCode() => Stages.Aggregate(Range.GetHashCode(), HashCode.Combine);

    /// <summary>All parts in one line.</summary>
    public override string ToString() => string.Join("; ", Parts().Select(part => $"{part.Part}: {part.Text}"));

    private (string Part, string Text)[] Parts() =>
    [
        ("range", Range.ToString()),
        ("cost", Cost.ToString()),
        ("aggregation", Aggregation.ToString()),
        ("optimisation", Optimisation.ToString()),
        ("sub-pixel", SubPixel.ToString()),
        ("checks", Text(Checks)),
        ("confidence", Confidence.ToString()),
        ("filters", Text(Filters)),
    ];

    private static string Text<T>(ImmutableArray<T> stages) => stages.IsDefaultOrEmpty ? "none" : string.Join(" + ", stages);
}
