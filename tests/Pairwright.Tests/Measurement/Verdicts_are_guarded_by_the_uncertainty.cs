using Pairwright.Measurement;
using Xunit;

namespace Pairwright.Tests.Measurement;

public class Verdicts_are_guarded_by_the_uncertainty
{
    [Theory]
    [InlineData(1.2, 0.1, VerdictOutcome.Met)]
    [InlineData(1.3, 0.1, VerdictOutcome.Met)]
    [InlineData(1.31, 0.1, VerdictOutcome.Undecided)]
    [InlineData(1.69, 0.1, VerdictOutcome.Undecided)]
    [InlineData(1.71, 0.1, VerdictOutcome.NotMet)]
    [InlineData(1.5, 0.0, VerdictOutcome.Met)]
    public void At_most_is_met_when_value_and_expanded_uncertainty_stay_below(double value, double sigma, VerdictOutcome outcome)
    {
        // Guarded acceptance and rejection with g = U = 2u: JCGM 106:2012, 8.3.
        Assert.Equal(outcome, Requirement.AtMost("cup", 1.5.Millimetres()).Judge(new(value, sigma, 0, "mm")).Outcome);
    }

    [Theory]
    [InlineData(9.8, VerdictOutcome.NotMet)]
    [InlineData(10.1, VerdictOutcome.Undecided)]
    [InlineData(10.5, VerdictOutcome.Met)]
    [InlineData(10.9, VerdictOutcome.Undecided)]
    [InlineData(11.2, VerdictOutcome.NotMet)]
    public void Both_limits_of_an_interval_are_guarded(double value, VerdictOutcome outcome)
    {
        var measured = new MeasuredValue(value, 0.06, 0.03, "mm");
        var verdict = Requirement.Between("step", 10.Millimetres(), 11.Millimetres()).Judge(measured);
        Assert.Equal(outcome, verdict.Outcome);
        Assert.Equal(Math.Min(value - 10, 11 - value), verdict.Margin, 12);
        Assert.Equal(outcome, Requirement.Equal("step", 10.5.Millimetres(), 0.5.Millimetres()).Judge(measured).Outcome);
    }

    [Fact]
    public void A_value_too_uncertain_for_a_narrow_interval_is_undecided_wherever_it_lies_inside()
    {
        Assert.Equal(VerdictOutcome.Undecided, Requirement.Between("step", 10.Millimetres(), 11.Millimetres()).Judge(new(10.5, 0.4, 0, "mm")).Outcome);
    }

    [Fact]
    public void The_probability_of_conformance_is_that_of_the_guides_zener_diode()
    {
        // JCGM 106:2012, 7.2 and its example, typed from memory: −5.47 V with u = 0.05 V against at most −5.40 V conforms with Φ(1.4) = 0.92.
        var verdict = Requirement.AtMost("breakdown voltage", new Quantity(-5.40, "V")).Judge(new(-5.47, 0.05, 0, "V"));
        Assert.Equal(0.919, verdict.ConformanceProbability, 3);
        Assert.Equal(VerdictOutcome.Undecided, verdict.Outcome);
        Assert.Contains("91.9 %", verdict.Statement);
    }

    [Fact]
    public void The_probability_of_an_interval_is_the_one_random_trials_find()
    {
        var verdict = Requirement.Between("step", 10.Millimetres(), 11.Millimetres()).Judge(new(10.8, 0.2, 0.1, "mm"));
        var draw = new MonteCarloDraw(3);
        var inside = Enumerable.Range(0, 40_000).Count(_ => draw.Normal(10.8, Math.Sqrt(0.05)) is >= 10 and <= 11) / 40_000.0;
        Assert.Equal(inside, verdict.ConformanceProbability, 5 * Math.Sqrt(0.25 / 40_000));
    }

    [Fact]
    public void The_coverage_factor_widens_the_guard()
    {
        var measured = new MeasuredValue(1.25, 0.1, 0, "mm");
        var requirement = Requirement.AtMost("cup", 1.5.Millimetres());
        Assert.Equal(VerdictOutcome.Met, requirement.Judge(measured).Outcome);
        Assert.Equal(VerdictOutcome.Undecided, requirement.Judge(measured, coverageFactor: 3).Outcome);
    }

    [Theory]
    [InlineData(double.NaN, 0.1, 0.1, "nothing could be measured")]
    [InlineData(1.0, double.NaN, 0.1, "random part of its uncertainty is not known")]
    [InlineData(1.0, 0.1, double.NaN, "carries no covariance")]
    public void What_is_not_known_is_undecided_and_says_why(double value, double random, double common, string reason)
    {
        var verdict = Requirement.AtMost("cup", 1.5.Millimetres()).Judge(new(value, random, common, "mm"));
        Assert.Equal(VerdictOutcome.Undecided, verdict.Outcome);
        Assert.Contains(reason, verdict.Statement);
    }

    [Fact]
    public void Every_verdict_is_entered_in_the_ledger_when_it_is_made()
    {
        var name = $"cup {Guid.NewGuid()}";
        Requirement.AtMost(name, 1.5.Millimetres()).Judge(new(0.8, 0.1, 0.05, "mm"));
        var record = Assert.Single(VerdictLedger.All, record => record.Requirement == name);
        Assert.Equal(VerdictRecord.Met, record.Outcome);
        Assert.Equal("at most 1.5 mm", record.Limit);
        Assert.Equal(0.7, record.Margin, 12);
        Assert.Equal(2 * Math.Sqrt(0.0125), record.ExpandedUncertainty, 12);
        Assert.Equal($"{name}: 0.80 mm ± 0.22 mm (k = 2) against at most 1.5 mm is met (0.70 mm inside the limit, probability of conformance above 99.9 %).", record.Statement);
    }

    [Fact]
    public void A_requirement_that_makes_no_sense_is_refused_in_one_sentence()
    {
        Assert.Throws<UserErrorException>(() => Requirement.AtMost(" ", 1.Millimetres()));
        Assert.Throws<UserErrorException>(() => Requirement.Between("step", 2.Millimetres(), 1.Millimetres()));
        Assert.Throws<UserErrorException>(() => Requirement.Equal("step", 2.Millimetres(), 0.1.Pixels()));
        Assert.Throws<UserErrorException>(() => Requirement.AtMost("step", double.NaN.Millimetres()));
        var error = Assert.Throws<UserErrorException>(() => Requirement.AtMost("step", 2.Millimetres()).Judge(new(1, 0, 0, "px")));
        Assert.Contains("'step'", error.Message);
    }
}
