using Pairwright.Geometry;
using Pairwright.Measurement;
using Xunit;

namespace Pairwright.Tests.Measurement;

public class Values_carry_their_uncertainty
{
    [Theory]
    [InlineData(12.3456, 0.0312, 0.0401, "12.346 mm ± 0.051 mm (1 σ; random 0.031, common 0.040)")]
    [InlineData(-0.5, 0.0996, 0, "-0.50 mm ± 0.10 mm (1 σ; random 0.10, common 0.00)")]
    [InlineData(1234.5, 0, 123, "1230 mm ± 120 mm (1 σ; random 0, common 120)")]
    [InlineData(3, 0, 0, "3 mm")]
    [InlineData(3.21, 0.04, double.NaN, "3.210 mm ± unknown (1 σ; random 0.040, common unknown)")]
    [InlineData(double.NaN, 0.04, 0.03, "unknown ± 0.050 mm (1 σ; random 0.040, common 0.030)")]
    public void The_uncertainty_is_written_to_two_digits_and_the_value_to_match(double value, double random, double common, string text)
    {
        // The rule: JCGM 100:2008, 7.2.6.
        Assert.Equal(text, new MeasuredValue(value, random, common, "mm").ToString());
    }

    [Fact]
    public void The_end_gauge_of_the_guide_comes_out_at_32_nanometres()
    {
        // JCGM 100:2008, H.1, table H.1, typed from memory: contributions of 25, 9.7, 2.9 and 16.6 nm combine to 32 nm.
        var length = new MeasuredValue(50_000_623, 0, 25, "nm")
            + new MeasuredValue(215, 9.7, 0, "nm")
            + new MeasuredValue(0, 0, 2.9, "nm")
            + new MeasuredValue(0, 16.6, 0, "nm");
        Assert.Equal(50_000_838, length.Value, 6);
        Assert.Equal(32, length.StandardUncertainty, 0.5);
    }

    [Fact]
    public void What_two_values_of_one_rig_share_cancels_in_their_difference_and_adds_up_in_their_sum()
    {
        var rig = TestRig.Of();
        MeasuredValue Value(double value, double random, params double[] effects) => new(value, random, "mm", [new CommonPart(rig, [.. effects])]);
        var (a, b) = (Value(10, 0.3, 1, -2, 0.5), Value(7, 0.4, 1, -2, 0.25));

        Assert.Equal(0.25, (a - b).CommonSigma, 12);
        Assert.Equal(0.5, (a - b).RandomSigma, 12);
        Assert.Equal(Math.Sqrt(4 + 16 + 0.75 * 0.75), (a + b).CommonSigma, 12);
        Assert.Equal(0, (a - a).CommonSigma);
        Assert.Equal(a.CommonSigma, (2 * a - a).CommonSigma, 12);
        Assert.Equal(a.CommonSigma, MeasuredValue.Mean([a, a, a, a]).CommonSigma, 12);
        Assert.Equal(0.15, MeasuredValue.Mean([a, a, a, a]).RandomSigma, 12);
    }

    [Fact]
    public void A_rig_read_twice_is_still_one_rig()
    {
        MeasuredValue Value(Rig rig) => new(1, 0, "mm", [new CommonPart(rig, [3.0])]);
        Assert.Equal(0, (Value(TestRig.Of()) - Value(TestRig.Of())).CommonSigma);
        Assert.Equal(Math.Sqrt(18), (Value(TestRig.Of()) - Value(TestRig.Of(focal: 701))).CommonSigma, 12);
    }

    [Fact]
    public void Linear_combinations_have_the_variance_that_random_trials_have()
    {
        // Property over random combinations: the law of propagation against JCGM 101's trials, to 5 σ of a variance of 5,000 trials.
        var random = new Random(11);
        var rig = TestRig.Of();
        for (var round = 0; round < 5; round++)
        {
            var effects = Enumerable.Range(0, 3).Select(_ => Enumerable.Range(0, 4).Select(_ => TestRig.Gauss(random)).ToArray()).ToArray();
            var sigmas = Enumerable.Range(0, 3).Select(_ => random.NextDouble()).ToArray();
            var factors = Enumerable.Range(0, 3).Select(_ => TestRig.Gauss(random)).ToArray();
            var values = effects.Zip(sigmas, (e, sigma) => new MeasuredValue(0, sigma, "mm", [new CommonPart(rig, [.. e])])).ToArray();
            var combined = factors[0] * values[0] - factors[1] * values[1] + factors[2] * values[2];

            var trials = MonteCarlo.Propagate(
                draw =>
                {
                    var axes = Enumerable.Range(0, 4).Select(_ => draw.Normal(0, 1)).ToArray();
                    double One(int i) => effects[i].Zip(axes, (e, x) => e * x).Sum() + draw.Normal(0, sigmas[i]);
                    return factors[0] * One(0) - factors[1] * One(1) + factors[2] * One(2);
                },
                5000,
                round);
            Assert.Equal(1, trials.StandardUncertainty / combined.StandardUncertainty, 5 / Math.Sqrt(2 * 5000.0));
        }
    }

    [Fact]
    public void Repeats_give_the_standard_uncertainty_of_their_mean()
    {
        // s² = 2.5 by hand; of the mean 0.5, widened by √(4/2) after JCGM 101:2008, 6.4.9.4.
        var mean = MeasuredValue.OfRepeats([1, 2, 3, 4, 5], "mm");
        Assert.Equal(3, mean.Value);
        Assert.Equal(Math.Sqrt(0.5) * Math.Sqrt(2), mean.StandardUncertainty, 12);
        Assert.Throws<UserErrorException>(() => MeasuredValue.OfRepeats([1, 2, 3], "mm"));
    }

    [Fact]
    public void Values_in_different_units_do_not_add()
    {
        var error = Assert.Throws<UserErrorException>(() => new MeasuredValue(1, 0, 0, "mm") + new MeasuredValue(1, 0, 0, "px"));
        Assert.Contains("'mm'", error.Message);
    }

    [Fact]
    public void Quantities_are_kept_in_one_unit_of_their_kind()
    {
        Assert.Equal(1.5.Millimetres(), 0.15.Centimetres());
        Assert.Equal(1500.Millimetres(), 1.5.Metres());
        Assert.Equal("1.5 mm", 1500.Micrometres().ToString());
        Assert.Equal("0.5°", 0.5.Degrees().ToString());
        Assert.Equal(-0.25, (new MeasuredValue(24.75, 0.1, 0, "mm") - 25.Millimetres()).Value);
    }

    [Fact]
    public void What_repeats_of_an_unmoved_scene_share_does_not_average_out()
    {
        // 2,000 quantities with an error that all five repeats share and one that changes: the root mean square of error over u of their means is 1 where u is right.
        // Its own standard deviation is 1/√4000; the scatter of five is so rough that u may be off by a few per cent more.
        var random = new Random(17);
        foreach (var (shared, changing) in new[] { (0.03, 0.04), (0.05, 0.0), (0.02, 0.05) })
        {
            var stated = Math.Sqrt(shared * shared + changing * changing);
            var sum = 0.0;
            for (var trial = 0; trial < 2000; trial++)
            {
                var common = shared * TestRig.Gauss(random);
                var mean = MeasuredValue.MeanOfRepeats([.. Enumerable.Range(0, 5).Select(_ => new MeasuredValue(common + changing * TestRig.Gauss(random), stated, 0, "mm"))]);
                sum += mean.Value * mean.Value / (mean.RandomSigma * mean.RandomSigma);
            }

            Assert.InRange(Math.Sqrt(sum / 2000), 0.9, 1.15);
        }
    }

    [Fact]
    public void Three_repeats_are_too_few() =>
        Assert.Contains("3 repeated", Assert.Throws<UserErrorException>(() => MeasuredValue.MeanOfRepeats([1.0.Millimetres(), 2.0.Millimetres(), 3.0.Millimetres()])).Message, StringComparison.Ordinal);
}
