using System.Globalization;

namespace Pairwright.Imaging;

/// <summary>What two pictures of a pair have that makes matching harder than it need be, as sentences with figures.</summary>
internal static class PairWarnings
{
    /// <summary>The ratio of mean levels above which exposures count as different; common practice.</summary>
    public const double ExposureRatio = 1.25;

    /// <summary>The share of saturated pixels above which a picture counts as over-exposed; common practice.</summary>
    public const double SaturatedShare = 0.01;

    /// <summary>The ratio of sharpness above which one picture counts as softer; common practice.</summary>
    public const double SharpnessRatio = 1.3;

    /// <summary>The warnings, those of reading first.</summary>
    public static IReadOnlyList<string> Of(Picture left, Picture right, TimeSpan skewTolerance)
    {
        var warnings = new List<string>(left.ReadingWarnings.Union(right.ReadingWarnings));
        void Warn(FormattableString sentence) => warnings.Add(sentence.ToString(CultureInfo.InvariantCulture));

        if (left.Size != right.Size)
        {
            Warn($"The left picture is {left.Size} px and the right one {right.Size} px; that is right only for a rig of two different cameras.");
        }

        if (left.SignificantBits != right.SignificantBits)
        {
            Warn($"The left picture has {left.SignificantBits} significant bits and the right one {right.SignificantBits}; set both cameras to one pixel format.");
        }

        var (leftMean, rightMean) = (Exposure(left), Exposure(right));
        if (Ratio(leftMean, rightMean) > ExposureRatio)
        {
            Warn($"The left picture's mean level is {leftMean:0.0%} of full scale and the right one's {rightMean:0.0%}, a ratio of {Ratio(leftMean, rightMean):0.00}; set equal exposure and gain, or match with a cost that does without them, such as census.");
        }

        foreach (var (name, picture) in new[] { ("left", left), ("right", right) })
        {
            if (picture.SaturatedShare > SaturatedShare)
            {
                Warn($"{picture.SaturatedShare:0.0%} of the {name} picture's pixels are saturated (level {picture.SaturationLevel} or above) and hold nothing to match; shorten the exposure or remove the glare.");
            }
        }

        if (Ratio(left.Sharpness, right.Sharpness) > SharpnessRatio)
        {
            var softer = left.Sharpness < right.Sharpness ? "left" : "right";
            Warn($"The {softer} picture is the softer one (sharpness {left.Sharpness:0.000} per px left, {right.Sharpness:0.000} per px right); check its focus and that its lens is clean.");
        }

        if (left.CapturedAt is { } leftTime && right.CapturedAt is { } rightTime && (leftTime - rightTime).Duration() > skewTolerance)
        {
            var first = leftTime < rightTime ? "left" : "right";
            Warn($"The {first} picture was taken {(leftTime - rightTime).Duration().TotalMilliseconds:0.###} ms before the other, beyond the tolerance of {skewTolerance.TotalMilliseconds:0.###} ms; whatever moves has a wrong disparity, so check the trigger.");
        }

        return warnings;
    }

    private static double Exposure(Picture picture) => picture.MeanLevel / ((1 << picture.SignificantBits) - 1);

    private static double Ratio(double one, double other) => Math.Max(one, other) / Math.Min(one, other);
}
