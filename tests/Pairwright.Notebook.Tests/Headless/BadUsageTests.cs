using System.Text.Json.Nodes;
using Xunit;
using static Pairwright.Notebook.Tests.Headless.NotebookText;

namespace Pairwright.Notebook.Tests.Headless;

public sealed class BadUsageTests
{
    [Theory]
    [InlineData("", "is an empty file")]
    [InlineData("{ \"nbformat\": 4, \"cells\": [", "is not a notebook")]
    [InlineData("# just a text", "is not a notebook")]
    [InlineData("[1, 2, 3]", "is JSON but not a notebook")]
    [InlineData("{ \"a\": 1 }", "is JSON but not a notebook")]
    [InlineData("{ \"nbformat\": 3, \"worksheets\": [] }", "is in notebook format 3")]
    [InlineData("{ \"nbformat\": 4, \"cells\": [1] }", "is missing or damaged")]
    [InlineData("{ \"nbformat\": 4, \"nbformat_minor\": 5, \"metadata\": {}, \"cells\": [] }", "has no code cell")]
    [InlineData("{ \"nbformat\": 4, \"metadata\": { \"kernelspec\": { \"language\": \"fortran\" } }, \"cells\": [{ \"cell_type\": \"code\", \"source\": \"x\" }] }", "is a notebook in fortran")]
    public void A_file_that_is_no_notebook_is_refused_in_one_sentence_that_names_it(string content, string why)
    {
        var folder = Directory.CreateTempSubdirectory("pairwright-test-");
        try
        {
            var path = Path.Combine(folder.FullName, "odd.ipynb");
            File.WriteAllText(path, content);
            var refusal = Assert.Throws<Runner.BadUsageException>(() => Runner.Documents.NotebookDocument.Read(path));
            Assert.Contains("odd.ipynb", refusal.Message);
            Assert.Contains(why, refusal.Message);
            Assert.DoesNotContain('\n', refusal.Message);
        }
        finally
        {
            folder.Delete(recursive: true);
        }
    }

    [Fact]
    public async Task Without_a_command_the_help_is_printed_and_the_exit_code_is_64_and_0_when_it_was_asked_for()
    {
        using var none = await HeadlessRun.Command();
        using var asked = await HeadlessRun.Command("--help");

        Assert.Equal((64, 0), (none.ExitCode, asked.ExitCode));
        Assert.Equal(asked.Output, none.Output);
        Assert.Contains("pairwright run notebooks/commission-rig.ipynb", asked.Output);
        Assert.Contains("70  the launcher could not build", asked.Output);
        Assert.Empty(none.Errors);
    }

    [Fact]
    public async Task A_missing_notebook_exits_with_64_and_leaves_no_report()
    {
        using var run = await HeadlessRun.Command("run", "nowhere.ipynb");

        Assert.Equal(64, run.ExitCode);
        Assert.StartsWith("pairwright: There is no notebook nowhere.ipynb", run.Errors);
        Assert.Single(run.Errors.Trim().Split('\n'));
        Assert.False(Directory.Exists(Path.Combine(run.Folder, "reports")));
    }

    [Fact]
    public async Task A_notebook_that_is_not_JSON_exits_with_64()
    {
        using var run = HeadlessRun.In(Of(Code("1")));
        await File.WriteAllTextAsync(run.NotebookPath, "{ \"cells\": [\n oops");
        await run.CommandAsync("run", "tiny.ipynb");

        Assert.Equal(64, run.ExitCode);
        Assert.Contains("line 2 does not read as JSON", run.Errors);
    }

    [Theory]
    [InlineData("run", "a.ipynb", "--bogus")]
    [InlineData("run", "a.ipynb", "--time-limit", "soon")]
    [InlineData("run", "a.ipynb", "--time-limit", "-1")]
    [InlineData("run", "a.ipynb", "--memory-limit", "5")]
    [InlineData("walk", "a.ipynb")]
    public async Task A_command_line_that_makes_no_sense_exits_with_64_in_one_line(params string[] arguments)
    {
        using var run = await HeadlessRun.Command(arguments);

        Assert.Equal(64, run.ExitCode);
        Assert.Single(run.Errors.Trim().Split('\n'));
    }

    [Fact]
    public async Task A_code_cell_in_another_language_is_refused_before_anything_runs()
    {
        var other = Code("print(1)");
        other["metadata"] = new JsonObject { ["dotnet_interactive"] = new JsonObject { ["language"] = "fsharp" } };
        using var run = await HeadlessRun.Of(Of(Code("1"), other));

        Assert.Equal(64, run.ExitCode);
        Assert.Contains("Cell 2", run.Errors);
        Assert.Contains("fsharp", run.Errors);
        Assert.False(Directory.Exists(Path.Combine(run.Folder, "reports")));
    }

    [Fact]
    public async Task Reports_never_overwrite_the_notebook_itself()
    {
        using var run = HeadlessRun.In(Of(Code("1")));
        await run.CommandAsync("run", "tiny.ipynb", "--out", ".");

        Assert.Equal(64, run.ExitCode);
        Assert.Contains("would overwrite", run.Errors);
    }
}
