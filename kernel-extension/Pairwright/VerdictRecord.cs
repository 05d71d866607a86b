namespace Pairwright;

/// <summary>What one requirement came to: the line that a report, a build server and an archive keep of a verdict.</summary>
/// <param name="Requirement">The requirement's name, for example <c>cup of plank 3</c>.</param>
/// <param name="Outcome">One of <see cref="Met"/>, <see cref="NotMet"/> and <see cref="Undecided"/> (JCGM 106:2012).</param>
/// <param name="Value">The measured value, in <paramref name="Unit"/>; NaN when nothing could be measured.</param>
/// <param name="ExpandedUncertainty">The expanded uncertainty of the value, k times its standard uncertainty, in <paramref name="Unit"/>; NaN when unknown.</param>
/// <param name="CoverageFactor">The k of the expanded uncertainty; 2 unless the requirement says otherwise.</param>
/// <param name="Limit">The limit in words, with its unit, for example <c>at most 1.5 mm</c>.</param>
/// <param name="Margin">How far the value is inside the limit, in <paramref name="Unit"/>; negative when it is outside.</param>
/// <param name="Unit">The unit of the numbers, for example <c>mm</c>; empty for a pure number.</param>
/// <param name="Statement">One sentence that says the whole, for a reader who sees nothing else.</param>
/// <param name="At">When the verdict was made.</param>
public sealed record VerdictRecord(
    string Requirement,
    string Outcome,
    double Value,
    double ExpandedUncertainty,
    double CoverageFactor,
    string Limit,
    double Margin,
    string Unit,
    string Statement,
    DateTimeOffset At)
{
    /// <summary>The outcome of a requirement that the value meets with its whole uncertainty.</summary>
    public const string Met = "met";

    /// <summary>The outcome of a requirement that the value misses with its whole uncertainty.</summary>
    public const string NotMet = "not met";

    /// <summary>The outcome where the uncertainty reaches over the limit; it counts as not met.</summary>
    public const string Undecided = "undecided";
}
