using Pairwright.Notebook.Drawing;
using Xunit;

namespace Pairwright.Notebook.Tests.Drawing;

public sealed class TicksTests
{
    [Theory]
    [InlineData(0, 10, 5, new[] { 0.0, 2, 4, 6, 8, 10 })]
    [InlineData(-1, 1, 4, new[] { -1.0, -0.5, 0, 0.5, 1 })]
    [InlineData(0.13, 0.42, 3, new[] { 0.2, 0.3, 0.4 })]
    [InlineData(3, 3, 5, new[] { 3.0 })]
    public void Round_positions_lie_within_the_range(double least, double most, int about, double[] expected)
    {
        var ticks = Ticks.Within(least, most, about);

        Assert.Equal(expected.Length, ticks.Count);
        Assert.All(expected.Zip(ticks), pair => Assert.Equal(pair.First, pair.Second, 12));
    }

    [Fact]
    public void Steps_are_one_two_or_five_times_a_power_of_ten_and_about_as_many_as_asked()
    {
        var random = new Random(7);
        for (var trial = 0; trial < 500; trial++)
        {
            var span = Math.Pow(10, random.NextDouble() * 12 - 6);
            var step = Ticks.Step(span, 5);
            var leading = step / Math.Pow(10, Math.Floor(Math.Log10(step) + 1e-9));
            Assert.Contains(Math.Round(leading, 6), new[] { 1.0, 2, 5 });
            Assert.InRange(span / step, 3, 9);
        }
    }

    [Theory]
    [InlineData(0.30000000000000004, 0.1, "0.3")]
    [InlineData(-0.0, 1, "0")]
    [InlineData(-20, 10, "−20")]
    [InlineData(1500, 500, "1500")]
    [InlineData(0.0025, 0.0005, "0.0025")]
    public void Labels_have_the_decimals_that_the_step_needs(double position, double step, string expected) =>
        Assert.Equal(expected, Ticks.Label(position, step));
}
