using Pairwright.Notebook.Drawing;
using Xunit;

namespace Pairwright.Notebook.Tests.Drawing;

public sealed class NumbersTests
{
    // Two significant digits of the uncertainty, the value to the same place: JCGM 100:2008, 7.2.6.
    [Theory]
    [InlineData(83.20468, 0.0553, "mm", "83.205 ± 0.055 mm")]
    [InlineData(100.02147, 0.00035, "g", "100.02147 ± 0.00035 g")]
    [InlineData(1352.4, 56.3, "mm", "1352 ± 56 mm")]
    [InlineData(0.5, 0.0996, "px", "0.50 ± 0.10 px")]
    [InlineData(-0.26521, 0.00312, "", "−0.2652 ± 0.0031")]
    [InlineData(536, 0, "px", "536.000 px (held fixed)")]
    [InlineData(536, double.NaN, "px", "536.000 px (uncertainty unknown)")]
    [InlineData(double.NaN, 1, "px", "no value")]
    public void A_value_is_rounded_to_its_uncertainty(double value, double sigma, string unit, string expected) =>
        Assert.Equal(expected, Numbers.WithSigma(value, sigma, unit));

    [Theory]
    [InlineData(0.000012345, "1.23·10⁻⁵ mm")]
    [InlineData(12.3456, "12.3 mm")]
    [InlineData(0, "0 mm")]
    [InlineData(double.PositiveInfinity, "∞ mm")]
    [InlineData(double.NaN, "no value")]
    public void Significant_digits_are_kept_from_the_smallest_to_the_largest(double value, string expected) =>
        Assert.Equal(expected, Numbers.Significant(value, 3, "mm"));

    [Theory]
    [InlineData(0.4567, "45.7 %")]
    [InlineData(0.00321, "0.32 %")]
    [InlineData(0, "0.0 %")]
    [InlineData(1, "100.0 %")]
    public void Shares_are_shown_in_per_cent(double share, string expected) => Assert.Equal(expected, Numbers.Percent(share));
}
