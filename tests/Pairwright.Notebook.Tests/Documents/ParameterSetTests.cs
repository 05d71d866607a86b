using Pairwright.Runner;
using Pairwright.Runner.Documents;
using Xunit;

namespace Pairwright.Notebook.Tests.Documents;

public sealed class ParameterSetTests
{
    private const string Cell =
        """
        #r "nuget: Pairwright"
        // The tolerance.
        double toleranceMm = 1.5, coverage = 2;
        string folder = "boards";
        string? note = null;
        var name = "a"; var count = 3; var share = -0.5; var on = true;
        float gain = 1f; decimal price = 1m; long big = 1; char letter = 'a';
        int? few = null;
        TimeSpan wait = TimeSpan.Zero;
        """;

    [Theory]
    [InlineData("toleranceMm", "2", "2d")]
    [InlineData("coverage", "1e-3", "1e-3d")]
    [InlineData("toleranceMm", "-.5", "-.5d")]
    [InlineData("folder", "captures/boards", "\"captures/boards\"")]
    [InlineData("folder", "\"quoted\"", "\"quoted\"")]
    [InlineData("folder", "3", "\"3\"")]
    [InlineData("folder", "say \"hi\"", "\"say \\\"hi\\\"\"")]
    [InlineData("folder", "a\"; Environment.Exit(1); \"b", "\"a\\\"; Environment.Exit(1); \\\"b\"")]
    [InlineData("folder", "", "\"\"")]
    [InlineData("note", "null", "null")]
    [InlineData("name", "b", "\"b\"")]
    [InlineData("count", "4", "4")]
    [InlineData("share", "0.25", "0.25d")]
    [InlineData("on", "false", "false")]
    [InlineData("gain", "0.5", "0.5f")]
    [InlineData("price", "0.5", "0.5m")]
    [InlineData("big", "5000000000", "5000000000L")]
    [InlineData("letter", "b", "'b'")]
    [InlineData("few", "7", "7")]
    [InlineData("wait", "3", "3")]
    [InlineData("wait", "three", "\"three\"")]
    public void A_value_becomes_the_literal_of_its_parameters_type(string name, string value, string literal) =>
        Assert.Equal($"{name} = {literal};", ParameterSet.DeclaredIn(Cell).Assign([new(name, value)]));

    [Theory]
    [InlineData("count", "1.5")]
    [InlineData("count", "99999999999")]
    [InlineData("toleranceMm", "1,5")]
    [InlineData("toleranceMm", "NaN")]
    [InlineData("toleranceMm", "wide")]
    [InlineData("on", "yes")]
    [InlineData("letter", "ab")]
    [InlineData("unknown", "1")]
    public void A_value_that_does_not_fit_is_refused_by_name(string name, string value)
    {
        var refusal = Assert.Throws<BadUsageException>(() => ParameterSet.DeclaredIn(Cell).Assign([new(name, value)]));
        Assert.Contains(name, refusal.Message);
    }

    [Fact]
    public void Of_several_values_for_one_name_the_last_counts_and_a_value_may_hold_equals_signs() =>
        Assert.Equal(
            [new("b", "2"), new("a", "x=y")],
            ParameterSet.Split(["a=1", "b=2", "a=x=y"]));
}
