using Pairwright.Runner.Execution;
using Xunit;

namespace Pairwright.Notebook.Tests.Headless;

public sealed class CellSourceTests
{
    [Theory]
    [InlineData("#r \"nuget: Pairwright\"", true)]
    [InlineData("#r \"nuget:Pairwright.Notebook,1.0.0\"", true)]
    [InlineData("  #r \"../out/Pairwright.Notebook.dll\"", true)]
    [InlineData("#i \"nuget:../feed\"", true)]
    [InlineData("#i \"nuget:https://feed.example/v3/index.json\"", false)]
    [InlineData("#r \"nuget: Pairwrightly\"", false)]
    [InlineData("#r \"nuget: Humanizer\"", false)]
    [InlineData("#region Pairwright", false)]
    [InlineData("#if DEBUG", false)]
    [InlineData("var r = \"#r nuget: Pairwright\";", false)]
    public void Only_lines_that_bring_this_library_or_a_local_feed_become_comments(string line, bool commented) =>
        Assert.Equal(commented ? "// " + line : line, CellSource.Prepare(new JobCell("4", line)).Split('\n')[1]);

    [Fact]
    public void Places_are_stated_again_after_a_line_at_which_the_kernel_splits_the_cell() =>
        Assert.Equal(
            "#line 1 \"cell[4]\"\n#r \"nuget: Humanizer\"\n#line 2 \"cell[4]\"\nvar a = 1;\n",
            CellSource.Prepare(new JobCell("4", "#r \"nuget: Humanizer\"\nvar a = 1;")));
}
