using System.Runtime.CompilerServices;
using System.Text.Json.Nodes;
using System.Text.RegularExpressions;
using Pairwright.Tests;
using Xunit;

namespace Pairwright.Notebook.Tests.Headless;

/// <summary>The worked notebooks as a build server runs them.</summary>
public sealed partial class WorkedNotebookTests
{
    private static readonly string Notebooks = Path.Combine(Root(), "notebooks");

    // Source: 13 captures of a checkerboard with 25 mm squares, Debian's package opencv-doc.
    [SkippableFact]
    public async Task The_rig_of_the_real_boards_is_commissioned()
    {
        var boards = OpenData.Boards;
        using var run = await HeadlessRun.Command(
            "run", Path.Combine(Notebooks, "commission-rig.ipynb"), "--set", $"boards={boards}", "--set", "squareMm=25", "--set", "site=", "--set", "trueRig=");

        Assert.True(run.ExitCode == 0, run.Output + run.Errors);
        var verdicts = Verdicts(run, "commission-rig");
        Assert.Equal(4, verdicts.Count);
        Assert.All(verdicts, verdict => Assert.Equal("met", verdict!["outcome"]!.GetValue<string>()));
    }

    [Fact]
    public async Task The_rig_of_the_demo_is_commissioned_and_every_known_value_is_covered()
    {
        using var run = await HeadlessRun.Command("run", Path.Combine(Notebooks, "commission-rig.ipynb"));

        Assert.True(run.ExitCode == 0, run.Output + run.Errors);
        Assert.All(Verdicts(run, "commission-rig"), verdict => Assert.Equal("met", verdict!["outcome"]!.GetValue<string>()));
        var page = await File.ReadAllTextAsync(Path.Combine(run.Folder, "reports", "commission-rig.html"));

        // Truth: the simulator's. An expanded uncertainty with k = 2 covers 95 %: of 18 honest ones, three or more miss in 6 of 100 cases.
        var covered = Coverage().Matches(page).Select(match => (Name: match.Groups["known"].Value, Met: int.Parse(match.Groups["met"].Value), Of: int.Parse(match.Groups["of"].Value))).ToArray();
        Assert.Contains(covered, entry => entry.Of == 18 && entry.Met >= 16);
        Assert.Contains(covered, entry => entry is { Name: "stated", Of: 3, Met: 3 });
        Assert.Contains(covered, entry => entry.Of == 7 && entry.Met >= 6);
        Assert.Contains(covered, entry => entry.Of == 6 && entry.Met >= 5);
    }

    [Fact]
    public void Notebooks_are_kept_without_outputs_and_state_their_parameters()
    {
        Assert.All(Directory.GetFiles(Notebooks, "*.ipynb"), path =>
        {
            var cells = JsonNode.Parse(File.ReadAllText(path))!["cells"]!.AsArray().Where(cell => cell!["cell_type"]!.GetValue<string>() == "code").ToArray();
            Assert.All(cells, cell => Assert.Empty(cell!["outputs"]!.AsArray()));
            Assert.Single(cells, cell => cell!["metadata"]!["tags"]?.AsArray().Any(tag => tag!.GetValue<string>() == "parameters") == true);
        });
    }

    [GeneratedRegex(@"(?<met>\d+) of (?<of>\d+) (?<known>true|stated) values lie within the expanded uncertainty")]
    private static partial Regex Coverage();

    private static JsonArray Verdicts(HeadlessRun run, string name) =>
        JsonNode.Parse(File.ReadAllText(Path.Combine(run.Folder, "reports", $"{name}.verdicts.json")))!["verdicts"]!.AsArray();

    private static string Root([CallerFilePath] string path = "") => Path.GetFullPath(Path.Combine(Path.GetDirectoryName(path)!, "..", "..", ".."));
}
