using System.Runtime.CompilerServices;

namespace Pairwright.Matching;

/// <summary>How sure each match is, as far as its row tells: a number that orders matches. It stands beside the stages of a recipe and refuses nothing.</summary>
/// <remarks>The measures and their comparison: Hu and Mordohai, A quantitative evaluation of confidence measures for stereo vision, PAMI 2012.</remarks>
public abstract class Confidence : Stage
{
    /// <summary>One minus the ratio of the lowest total to the lowest one away from it: 0 for two equal ones, 1 where nothing else comes near.</summary>
    public static Confidence PeakRatio { get; } = new PeakRatioConfidence();

    /// <summary>How sharply the totals beside the lowest one rise: their sum above twice the lowest, over their sum.</summary>
    public static Confidence Curvature { get; } = new CurvatureConfidence();

    /// <summary>One over one plus the difference, in pixels, of the disparities that the match has from left to right and from right to left.</summary>
    public static Confidence LeftRight { get; } = new LeftRightConfidence();

    /// <summary>A confidence written as a function of a row.</summary>
    /// <param name="fill">Fills the confidences of the row's columns. It is called from several threads at once.</param>
    /// <param name="code">The text of <paramref name="fill"/>, which the compiler fills in; it tells recipes apart.</param>
    public static Confidence FromRow(RowConfidence fill, [CallerArgumentExpression(nameof(fill))] string code = "")
    {
        ArgumentNullException.ThrowIfNull(fill);
        return new CodeConfidence(fill, code);
    }

    /// <summary>Fills the confidences of a row.</summary>
    /// <param name="row">The row, after its checks; those that they refused have a confidence too.</param>
    /// <param name="confidence">One number per column to fill: 0 to 1, the higher the surer, NaN where nothing could be compared.</param>
    public abstract void Fill(RowMatches row, Span<float> confidence);
}
