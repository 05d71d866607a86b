using MathNet.Numerics.Distributions;

namespace Pairwright.Measurement;

/// <summary>What a measured value must meet: one or two limits with a name.</summary>
/// <example><code>Requirement.AtMost("cup of plank 3", 1.5.Millimetres()).Judge(cup)</code></example>
public sealed record Requirement
{
    private Requirement(string name, double lower, double upper, string unit, string limit)
    {
        if (string.IsNullOrWhiteSpace(name))
        {
            throw new UserErrorException("A requirement needs a name, so that a report can say which one was not met; give it one.");
        }

        if (double.IsNaN(lower) || double.IsNaN(upper) || lower > upper)
        {
            throw new UserErrorException($"The requirement '{name}' has limits that no value can meet ({limit}); correct them.");
        }

        (Name, Lower, Upper, Unit, Limit) = (name, lower, upper, unit, limit);
    }

    /// <summary>The name, for example <c>cup of plank 3</c>.</summary>
    public string Name { get; }

    /// <summary>The lower tolerance limit, in <see cref="Unit"/>; minus infinity where there is none.</summary>
    public double Lower { get; }

    /// <summary>The upper tolerance limit, in <see cref="Unit"/>; infinity where there is none.</summary>
    public double Upper { get; }

    /// <summary>The unit; empty for a pure number.</summary>
    public string Unit { get; }

    /// <summary>The limits in words, for example <c>at most 1.5 mm</c>.</summary>
    public string Limit { get; }

    /// <summary>The value must not exceed a limit.</summary>
    public static Requirement AtMost(string name, Quantity limit) =>
        new(name, double.NegativeInfinity, limit.Amount, limit.Unit, $"at most {limit}");

    /// <summary>The value must not fall below a limit.</summary>
    public static Requirement AtLeast(string name, Quantity limit) =>
        new(name, limit.Amount, double.PositiveInfinity, limit.Unit, $"at least {limit}");

    /// <summary>The value must lie between two limits, both included.</summary>
    /// <exception cref="UserErrorException">The units differ, or the limits are the wrong way round.</exception>
    public static Requirement Between(string name, Quantity lower, Quantity upper)
    {
        CheckUnits(name, lower, upper);
        return new(name, lower.Amount, upper.Amount, lower.Unit, $"from {lower} to {upper}");
    }

    /// <summary>The value must equal a nominal one within a tolerance on either side.</summary>
    /// <exception cref="UserErrorException">The units differ, or the tolerance is below zero.</exception>
    public static Requirement Equal(string name, Quantity nominal, Quantity tolerance)
    {
        CheckUnits(name, nominal, tolerance);
        return new(name, nominal.Amount - tolerance.Amount, nominal.Amount + tolerance.Amount, nominal.Unit, $"{nominal} ± {tolerance}");
    }

    /// <summary>Decides whether a value meets the requirement, and enters the verdict in the <see cref="VerdictLedger"/>.</summary>
    /// <param name="measured">The value.</param>
    /// <param name="coverageFactor">The k of the expanded uncertainty U by which every limit is guarded, zero or above; 0 is simple acceptance.</param>
    /// <returns>
    /// Met where value ± U lies wholly inside the limits, not met where it lies wholly beyond one of them, undecided otherwise
    /// (guarded acceptance and guarded rejection with a guard band of U, JCGM 106:2012, 8.3). A value or uncertainty that is not known is undecided.
    /// </returns>
    /// <exception cref="UserErrorException">The value's unit is not the requirement's.</exception>
    public Verdict Judge(MeasuredValue measured, double coverageFactor = 2)
    {
        ArgumentNullException.ThrowIfNull(measured);
        ArgumentOutOfRangeException.ThrowIfNegative(coverageFactor);
        if (measured.Unit != Unit)
        {
            throw new UserErrorException(
                $"The requirement '{Name}' is stated in '{Unit}', but the value to judge is in '{measured.Unit}'; state the limit in the value's unit.");
        }

        var verdict = new Verdict(this, measured, coverageFactor, DateTimeOffset.Now);
        VerdictLedger.Record(verdict.ToRecord());
        return verdict;
    }

    /// <summary>The name and the limits.</summary>
    public override string ToString() => $"{Name}: {Limit}";

    internal VerdictOutcome Decide(double value, double expanded) =>
        double.IsNaN(value + expanded) ? VerdictOutcome.Undecided
        : value - expanded >= Lower && value + expanded <= Upper ? VerdictOutcome.Met
        : value + expanded < Lower || value - expanded > Upper ? VerdictOutcome.NotMet
        : VerdictOutcome.Undecided;

    /// <summary>The probability that a quantity with a normal distribution lies inside the limits (JCGM 106:2012, 7).</summary>
    internal double ConformanceProbability(double value, double sigma)
    {
        if (double.IsNaN(value + sigma))
        {
            return double.NaN;
        }

        if (sigma == 0)
        {
            return value >= Lower && value <= Upper ? 1 : 0;
        }

        double Below(double limit) => double.IsInfinity(limit) ? (limit > 0 ? 1 : 0) : Normal.CDF(value, sigma, limit);
        return Below(Upper) - Below(Lower);
    }

    private static void CheckUnits(string name, Quantity a, Quantity b)
    {
        if (a.Unit != b.Unit)
        {
            throw new UserErrorException($"The requirement '{name}' mixes '{a.Unit}' and '{b.Unit}'; state both in one unit.");
        }
    }
}
