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

    [Fact]
    public async Task A_run_that_stated_no_requirement_says_so_at_the_top_of_its_page_and_is_one_skipped_case()
    {
        using var run = await HeadlessRun.Of(Of(Markdown("# Looking around"), Code("1 + 1")));

        Assert.Equal(0, run.ExitCode);
        Assert.Equal("1", run.Suite.Attribute("skipped")!.Value);
        Assert.Single(run.Suite.Elements("testcase"), test => test.Element("skipped") is not null);
        var page = run.Page;
        var notice = page.IndexOf("stated no requirement", StringComparison.Ordinal);
        Assert.InRange(notice, 0, page.IndexOf("<main>", StringComparison.Ordinal));
    }
}
