using System.Security.Cryptography;
using System.Text.Json.Nodes;
using Pairwright.Notebook.Tests.Documents;
using Pairwright.Runner.Documents;
using Xunit;

namespace Pairwright.Notebook.Tests.Headless;

public sealed class WholeRunTests(WholeRun whole) : IClassFixture<WholeRun>
{
    private readonly HeadlessRun _run = whole.Run;

    [Fact]
    public void A_run_whose_requirements_are_all_met_exits_with_0_and_passes_in_JUnit()
    {
        Assert.Equal(0, _run.ExitCode);
        Assert.Equal("All 2 requirements are met.", _run.Summary);
        Assert.Equal("2", _run.Suite.Attribute("tests")!.Value);
        Assert.Equal("0", _run.Suite.Attribute("failures")!.Value);
        Assert.Equal(["cup", "twist"], _run.Suite.Elements("testcase").Select(test => test.Attribute("name")!.Value));
    }

    [Fact]
    public void The_terminal_shows_every_cell_as_it_ends_then_the_verdicts_and_where_the_reports_lie()
    {
        for (var cell = 1; cell <= 13; cell++)
        {
            Assert.Matches($@"(?m)^ *{cell}/13 .* s  ✓", _run.Output);
        }
        Assert.Contains("1.23 ± 0.13 mm (k = 2)", _run.Output);
        Assert.Contains(Path.Combine(_run.Folder, "reports", "tiny.html"), _run.Output);
        Assert.Empty(_run.Errors);
    }

    [Fact]
    public void Set_values_replace_the_parameters_of_the_tagged_cell_and_stand_in_a_cell_behind_it()
    {
        var injected = _run.Notebook["cells"]![3]!;
        Assert.Equal("injected-parameters", injected["metadata"]!["tags"]![0]!.GetValue<string>());
        Assert.Equal("0.5|captures/day 2|True|-3", TextOf(WholeRun.Parametric));
    }

    [Fact]
    public void Cells_keep_their_numbers_whatever_was_set() =>
        Assert.Equal(
            Enumerable.Range(1, 12),
            _run.Notebook["cells"]!.AsArray().Select(cell => cell!["execution_count"]).OfType<JsonValue>().Select(count => count.GetValue<int>()));

    [Fact]
    public void Texts_and_values_come_out_as_a_kernel_would_leave_them()
    {
        var outputs = _run.OutputsOf(WholeRun.Streams);
        Assert.Equal("one two\n", NotebookCell.TextOf(outputs[0]!["text"]));
        Assert.Equal(("stderr", "aside\n"), (NotebookCell.TextOf(outputs[1]!["name"]), NotebookCell.TextOf(outputs[1]!["text"])));
        Assert.Equal("execute_result", NotebookCell.TextOf(outputs[2]!["output_type"]));
        Assert.Equal(WholeRun.Streams, outputs[2]!["execution_count"]!.GetValue<int>());

        Assert.Equal("a < b", NotebookCell.TextOf(Assert.Single(_run.OutputsOf(WholeRun.Updating))!["data"]!["text/plain"]));
        Assert.Contains("a &lt; b", _run.Page);
    }

    [Fact]
    public void A_shown_value_that_a_later_cell_updates_is_replaced_where_it_stands() =>
        Assert.Contains("2002", NotebookCell.TextOf(Assert.Single(_run.OutputsOf(WholeRun.Live))!["data"]!["text/plain"]));

    [Fact]
    public void Lines_that_bring_the_library_into_another_host_do_no_harm_here() =>
        Assert.Equal("here", Value(WholeRun.FromPackage));

    [Fact]
    public void Cells_find_every_type_of_the_library_by_its_short_name_without_a_using_line() =>
        Assert.Equal(string.Concat(WholeRun.LibraryTypes.Select(type => type.FullName + "\n")), TextOf(WholeRun.Types));

    [Fact]
    public void Cells_find_files_beside_the_notebook() =>
        Assert.Equal("found beside", Value(WholeRun.File));

    [Fact]
    public void A_cell_that_prints_without_end_does_not_fill_the_report()
    {
        Assert.InRange(new FileInfo(_run.ReportPath("html")).Length, 1_000_000, 1_100_000);
        Assert.EndsWith("… the rest of this cell's text is left out.\n", TextOf(WholeRun.Endless));
    }

    [Fact]
    public void Markdown_and_raw_cells_are_kept()
    {
        Assert.Equal(["markdown", "raw", "code"], _run.Notebook["cells"]!.AsArray().Take(3).Select(cell => NotebookCell.TextOf(cell!["cell_type"])));
        Assert.Contains("<em>text</em>", _run.Page);
        Assert.Contains("<pre class=\"raw\">as it is</pre>", _run.Page);
    }

    [Fact]
    public void The_verdict_file_says_which_notebook_with_which_parameters_and_which_version_made_it()
    {
        var provenance = _run.Verdicts["provenance"]!;
        Assert.Equal(1, _run.Verdicts["schemaVersion"]!.GetValue<int>());
        Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(File.ReadAllBytes(_run.NotebookPath))), provenance["notebookSha256"]!.GetValue<string>());
        Assert.Equal("0.25", provenance["parameters"]!["toleranceMm"]!.GetValue<string>());
        Assert.Equal(Provenance.Version, provenance["toolVersion"]!.GetValue<string>());
        Assert.Equal(1.2345, _run.Verdicts["verdicts"]![0]!["value"]!.GetValue<double>());
    }

    [Fact]
    public void Four_reports_are_left_and_no_half_written_file() =>
        Assert.Equal(
            ["tiny.html", "tiny.ipynb", "tiny.junit.xml", "tiny.verdicts.json"],
            Directory.GetFiles(Path.Combine(_run.Folder, "reports")).Select(Path.GetFileName).Order(StringComparer.Ordinal));

    [SkippableFact]
    public void The_executed_notebook_is_valid_nbformat_4_5_by_its_own_validator() => NotebookValidator.Judge(_run.ReportPath("ipynb"));

    [Fact]
    public async Task An_executed_notebook_run_again_starts_from_its_own_parameters_and_without_a_requirement_says_so()
    {
        using var again = await HeadlessRun.Of(NotebookText.Of([.. _run.Notebook["cells"]!.AsArray().Skip(2).Take(4).Select(cell => cell!.DeepClone().AsObject())]));

        Assert.Equal(3, again.Notebook["cells"]!.AsArray().Count);
        Assert.Equal("3|boards|False|13", NotebookCell.TextOf(again.OutputsOf(WholeRun.Parametric)[0]!["text"]));
        AssertThatNoRequirementIsSaid(again);
    }

    /// <summary>A run that stated no requirement says so at the top of its page, and cannot pass for a good one in JUnit.</summary>
    private static void AssertThatNoRequirementIsSaid(HeadlessRun run)
    {
        Assert.Equal(0, run.ExitCode);
        Assert.Equal("1", run.Suite.Attribute("skipped")!.Value);
        Assert.Single(run.Suite.Elements("testcase"), test => test.Element("skipped") is not null);
        Assert.InRange(run.Page.IndexOf("stated no requirement", StringComparison.Ordinal), 0, run.Page.IndexOf("<main>", StringComparison.Ordinal));
    }

    private string TextOf(int cell) => NotebookCell.TextOf(_run.OutputsOf(cell)[0]!["text"]);

    private string Value(int cell) => NotebookCell.TextOf(Assert.Single(_run.OutputsOf(cell))!["data"]!["text/plain"]);
}
