using System.Diagnostics;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Notebook.Tests.Matching;

public sealed class MatchCommandTests : IDisposable
{
    private const string Pattern = "left_*.png";
    private const string Partner = "right_*.png";

    private readonly MatchFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task A_pair_of_random_dots_comes_out_at_its_disparity_and_is_judged_by_the_truth()
    {
        _folder.AddPair("left.png", "right.png");
        _folder.AddTruth("truth.pfm", MatchFolder.Disparity);

        await _folder.RunAsync("left.png", "right.png", "--range", "-2:12", "--truth", "truth.pfm", "--sigma", "sigma.tif", "--memory", "50", "--out", "maps/map.pfm");

        Assert.Equal((0, ""), (_folder.ExitCode, _folder.Errors));
        var map = MapFile.Read(_folder["maps/map.pfm"]);
        Assert.InRange(map.ValidShare, 0.7, 1);
        Assert.All(map.Values.ToArray().Where(value => !float.IsNaN(value)), value => Assert.Equal(MatchFolder.Disparity, value, 0.1));
        Assert.Equal(map.Size, MapFile.Read(_folder["sigma.tif"]).Size);

        var accuracy = _folder.Record("maps/map.json")["accuracy"]!;
        Assert.Equal(0, accuracy["regions"]![0]!["shareBeyondPx"]!["1"]!.GetValue<double>());
        Assert.Contains("all pixels:", _folder.Output);
        Assert.Equal(["left.png", "maps/map.json", "maps/map.pfm", "right.png", "sigma.tif", "truth.pfm"], _folder.Files);
    }

    [Fact]
    public async Task Gaps_are_filled_only_when_asked_for_and_a_mask_says_which_values_were_not_measured()
    {
        _folder.AddPair("left.png", "right.png");
        _folder.AddTruth("truth.pfm", MatchFolder.Disparity);
        await _folder.RunAsync("left.png", "right.png", "--range", "0:12", "--out", "measured.pfm");
        await _folder.RunAsync("left.png", "right.png", "--range", "0:12", "--truth", "truth.pfm", "--fill", "--out", "all.pfm");

        Assert.Equal((0, ""), (_folder.ExitCode, _folder.Errors));
        var (measured, all, mask) = (MapFile.Read(_folder["measured.pfm"]), MapFile.Read(_folder["all.pfm"]), Mask.Read(_folder["all.filled.png"]));
        Assert.Equal(1, all.ValidShare);
        Assert.InRange(mask.Share, 0.01, 0.3);
        for (var i = 0; i < all.Values.Length; i++)
        {
            Assert.Equal(float.IsNaN(measured.Values[i]), mask.Usable[i]);
            Assert.Equal(mask.Usable[i] ? MatchFolder.Disparity : measured.Values[i], all.Values[i], 0.1);
        }

        var record = _folder.Record("all.json");
        Assert.Equal(1, record["accuracyWithFilled"]!["regions"]![0]!["measuredShare"]!.GetValue<double>());
        Assert.Equal(measured.ValidShare, record["accuracy"]!["regions"]![0]!["measuredShare"]!.GetValue<double>(), 1e-9);
    }

    [Fact]
    public async Task With_a_rig_depth_and_cloud_lie_where_Z_equals_focal_length_times_baseline_over_disparity()
    {
        _folder.AddPair("left.png", "right.png");
        _folder.AddRig("rig.yaml", focalPx: 400, baselineMm: 20);

        await _folder.RunAsync("left.png", "right.png", "--rig", "rig.yaml", "--depths", "1000:4000", "--depth", "depth.pfm", "--cloud", "cloud.ply", "--out", "map.pfm");

        Assert.Equal((0, ""), (_folder.ExitCode, _folder.Errors));
        const double zMm = 400 * 20.0 / MatchFolder.Disparity;
        var depths = MapFile.Read(_folder["depth.pfm"]).Values.ToArray().Where(value => !float.IsNaN(value)).ToList();
        Assert.NotEmpty(depths);
        Assert.All(depths, z => Assert.Equal(zMm, z, zMm * 0.02));
        var points = PointFile.Read(_folder["cloud.ply"]).Positions;
        Assert.Equal(depths.Count, points.Length);
        Assert.Equal(zMm, points.Average(point => point.Z), zMm * 0.01);
    }

    [Fact]
    public async Task Pairs_that_fit_a_pattern_are_matched_one_by_one_and_a_broken_one_is_named_and_passed_over()
    {
        foreach (var part in (string[])["2", "10", "3"])
        {
            _folder.AddPair($"left_{part}.png", $"right_{part}.png");
        }
        _folder.AddPair("left_11.png", "elsewhere/right_11.png");
        var broken = _folder["right_3.png"];
        var whole = await File.ReadAllBytesAsync(broken);
        await File.WriteAllBytesAsync(broken, whole[..200]);

        await _folder.RunAsync(Pattern, Partner, "--range", "0:12", "--out", "map_*.pfm");
        Assert.Equal(2, _folder.ExitCode);
        Assert.Contains("left_11.png has no partner", _folder.Output);
        Assert.Matches(@"(?m)^ *1/3 +2 .*✓\n *2/3 +3 .*right_3\.png.*✗\n *3/3 +10 .*✓$", _folder.Output);
        Assert.Contains("2 of 3 pairs are matched; 2 could not be: see above.", _folder.Output);
        Assert.DoesNotContain("map_3.pfm", _folder.Files);

        // Mended, and run again: only what is missing is done.
        await File.WriteAllBytesAsync(broken, whole);
        File.Delete(_folder["left_11.png"]);
        var before = File.GetLastWriteTimeUtc(_folder["map_2.pfm"]);
        await _folder.RunAsync(Pattern, Partner, "--range", "0:12", "--out", "map_*.pfm");
        Assert.Equal(0, _folder.ExitCode);
        Assert.Contains("3 of 3 pairs are matched, 2 of them by an earlier run.", _folder.Output);
        Assert.Equal(before, File.GetLastWriteTimeUtc(_folder["map_2.pfm"]));

        // Another range is another match, and so is another picture.
        _folder.AddPair("left_2.png", "right_2.png", scale: 2);
        await _folder.RunAsync(Pattern, Partner, "--range", "0:12", "--out", "map_*.pfm");
        Assert.Contains("3 of 3 pairs are matched, 2 of them by an earlier run.", _folder.Output);
        await _folder.RunAsync(Pattern, Partner, "--range", "0:13", "--out", "map_*.pfm");
        Assert.Contains("3 of 3 pairs are matched.", _folder.Output);
    }

    [Fact]
    public async Task A_run_that_is_stopped_leaves_whole_files_and_says_how_to_go_on()
    {
        for (var part = 0; part < 40; part++)
        {
            _folder.AddPair($"left_{part}.png", $"right_{part}.png", scale: part == 0 ? 1 : 4);
        }

        string[] command = [Pattern, Partner, "--range", "0:63", "--out", "map_*.pfm"];
        using var process = _folder.Start(command);
        var first = await process.StandardOutput.ReadLineAsync();
        Assert.Contains("40 pairs", first);
        Assert.Contains("1/40", await process.StandardOutput.ReadLineAsync());
        Process.Start("kill", ["-INT", process.Id.ToString()])!.WaitForExit();
        await _folder.Finish(process);

        Assert.Equal(130, _folder.ExitCode);
        Assert.Matches(@"Stopped after \d+ of 40; run the same command again to go on from there\.", _folder.Output);
        Assert.DoesNotContain(_folder.Files, file => file.EndsWith(".part", StringComparison.Ordinal));
        var maps = _folder.Files.Count(file => file.EndsWith(".pfm", StringComparison.Ordinal));
        Assert.InRange(maps, 1, 39);
    }

    [Theory]
    [InlineData("--range 5", "--range 5: give the least and the greatest")]
    [InlineData("--range 12:0", "The search range 12:0 is reversed or empty")]
    [InlineData("", "What to search is not stated")]
    [InlineData("--range 0:9 --depths 1:2 --geometry g.yaml", "--range and --depths both state what to search")]
    [InlineData("--range 0:9 --depth d.pfm", "take a rig")]
    [InlineData("--range 0:9 --rig r.yaml --geometry g.yaml", "give one of them")]
    [InlineData("--range 0:9 --rig nowhere.yaml", "'nowhere.yaml' does not exist")]
    [InlineData("--range 0:9 --recipe nowhere.yaml", "'nowhere.yaml' does not exist")]
    [InlineData("--range 0:9 --sigma map.pfm", "map.pfm is named for two things to write")]
    [InlineData("--range 0:9 --truth t_*.pfm", "t_*.pfm has a *, but LEFT has none")]
    [InlineData("--range 0:9 --truth t.pfm --truth-scale 0", "--truth-scale 0")]
    [InlineData("--range 0:9 --memory 0", "A memory limit of 0 MB allows nothing")]
    [InlineData("--range 0:500", "The search range 0:500 does not fit pictures 96 px wide")]
    public async Task Options_that_make_no_sense_exit_with_64_in_one_line(string options, string why)
    {
        _folder.AddPair("left.png", "right.png");

        await _folder.RunAsync(["left.png", "right.png", "--out", "map.pfm", .. options.Split(' ', StringSplitOptions.RemoveEmptyEntries)]);

        Assert.Equal(64, _folder.ExitCode);
        Assert.Contains(why, Assert.Single(_folder.Errors.Trim().Split('\n')));
        Assert.Equal(["left.png", "right.png"], _folder.Files);
    }
}
