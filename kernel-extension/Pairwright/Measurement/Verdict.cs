using System.Globalization;

namespace Pairwright.Measurement;

/// <summary>A requirement held against a measured value: met, not met or undecided, by how much and how surely.</summary>
/// <remarks>Made by <see cref="Requirement.Judge"/>, which enters it in the <see cref="VerdictLedger"/>.</remarks>
public sealed class Verdict
{
    internal Verdict(Requirement requirement, MeasuredValue measured, double coverageFactor, DateTimeOffset at)
    {
        (Requirement, Measured, CoverageFactor, At) = (requirement, measured, coverageFactor, at);
        ExpandedUncertainty = measured.Expanded(coverageFactor);
        Outcome = requirement.Decide(measured.Value, ExpandedUncertainty);
        Margin = Math.Min(measured.Value - requirement.Lower, requirement.Upper - measured.Value);
        ConformanceProbability = requirement.ConformanceProbability(measured.Value, measured.StandardUncertainty);
    }

    /// <summary>The requirement.</summary>
    public Requirement Requirement { get; }

    /// <summary>The measured value.</summary>
    public MeasuredValue Measured { get; }

    /// <summary>The k of the expanded uncertainty.</summary>
    public double CoverageFactor { get; }

    /// <summary>k times the standard uncertainty, in the value's unit: the guard band of every limit.</summary>
    public double ExpandedUncertainty { get; }

    /// <summary>Met, not met or undecided.</summary>
    public VerdictOutcome Outcome { get; }

    /// <summary>How far the value is inside the nearer limit, in the value's unit; negative where it is outside. The uncertainty is not taken off.</summary>
    public double Margin { get; }

    /// <summary>The probability, 0 to 1, that the quantity lies inside the limits, for a normal distribution about the value (JCGM 106:2012, 7); NaN where it is not known.</summary>
    public double ConformanceProbability { get; }

    /// <summary>When the verdict was made.</summary>
    public DateTimeOffset At { get; }

    /// <summary>One sentence that says the whole.</summary>
    public string Statement =>
        $"{Requirement.Name}: {MeasuredText.Expanded(Measured, CoverageFactor)} against {Requirement.Limit} is {OutcomeText}{Reason}.";

    /// <summary>The outcome in words: <c>met</c>, <c>not met</c> or <c>undecided</c>.</summary>
    public string OutcomeText => Outcome switch
    {
        VerdictOutcome.Met => VerdictRecord.Met,
        VerdictOutcome.NotMet => VerdictRecord.NotMet,
        _ => VerdictRecord.Undecided,
    };

    /// <summary>The line that a report keeps.</summary>
    public VerdictRecord ToRecord() => new(
        Requirement.Name, OutcomeText, Measured.Value, ExpandedUncertainty, CoverageFactor, Requirement.Limit, Margin, Measured.Unit, Statement, At);

    /// <summary>The statement.</summary>
    public override string ToString() => Statement;

    private string Reason
    {
        get
        {
            if (double.IsNaN(Measured.Value))
            {
                return ", because nothing could be measured";
            }

            if (double.IsNaN(Measured.RandomSigma))
            {
                return ", because the random part of its uncertainty is not known";
            }

            if (double.IsNaN(Measured.CommonSigma))
            {
                return ", because the common part of its uncertainty is not known (the rig carries no covariance)";
            }

            var margin = MeasuredText.WithUnit(
                ExpandedUncertainty > 0 ? MeasuredText.Matching(Math.Abs(Margin), ExpandedUncertainty) : MeasuredText.Plain(Math.Abs(Margin)), Measured.Unit);
            var side = Margin >= 0 ? "inside" : "outside";
            var probability = Measured.StandardUncertainty > 0 ? $", probability of conformance {Percent(ConformanceProbability)}" : "";
            return Outcome == VerdictOutcome.Undecided
                ? $", because the uncertainty reaches over the limit ({margin} {side} it{probability})"
                : $" ({margin} {side} the limit{probability})";
        }
    }

    private static string Percent(double share) => share switch
    {
        > 0.999 => "above 99.9 %",
        < 0.001 => "below 0.1 %",
        _ => $"{(100 * share).ToString("F1", CultureInfo.InvariantCulture)} %",
    };
}
