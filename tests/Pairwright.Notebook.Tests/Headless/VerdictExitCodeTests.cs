using Xunit;
using static Pairwright.Notebook.Tests.Headless.NotebookText;

namespace Pairwright.Notebook.Tests.Headless;

public sealed class VerdictExitCodeTests
{
    [Fact]
    public async Task One_requirement_that_is_missed_or_undecided_makes_the_exit_code_1_and_a_failure_in_JUnit()
    {
        using var run = await HeadlessRun.Of(Of(Code(Verdict("met") + Verdict("undecided") + Verdict("not met"))));

        Assert.Equal(1, run.ExitCode);
        Assert.Equal("2", run.Suite.Attribute("failures")!.Value);
        Assert.Equal(["undecided", "not met"], run.Suite.Descendants("failure").Select(failure => failure.Attribute("type")!.Value));
        Assert.Equal("not met", run.Verdicts["outcome"]!.GetValue<string>());
        Assert.Contains("1 undecided, which counts as not met", run.Summary);
    }
}
