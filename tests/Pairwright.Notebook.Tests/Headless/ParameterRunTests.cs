using Xunit;
using static Pairwright.Notebook.Tests.Headless.NotebookText;

namespace Pairwright.Notebook.Tests.Headless;

public sealed class ParameterRunTests
{
    [Theory]
    [InlineData("width=3", "declares no variable width; that cell declares views")]
    [InlineData("views=many", "views takes a whole number")]
    [InlineData("views", "is not of the form NAME=VALUE")]
    public async Task A_value_that_does_not_fit_exits_with_64(string assignment, string why)
    {
        using var run = await HeadlessRun.Of(Of(Parameters("int views = 1;")), "--set", assignment);

        Assert.Equal(64, run.ExitCode);
        Assert.Contains(why, run.Errors);
    }

    [Fact]
    public async Task Set_without_a_tagged_cell_exits_with_64()
    {
        using var run = await HeadlessRun.Of(Of(Code("int views = 1;")), "--set", "views=2");

        Assert.Equal(64, run.ExitCode);
        Assert.Contains("needs a cell tagged 'parameters'", run.Errors);
    }
}
