using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Pairs_are_found_by_name
{
    [Theory]
    [InlineData("left_03.png", "right_03.png", "03")]
    [InlineData("03_left.png", "03_right.png", "03")]
    [InlineData("Left01.png", "Right01.png", "01")]
    [InlineData("belt-left-7.png", "belt-right-7.png", "belt_7")]
    [InlineData("plank.LEFT.tif", "plank.RIGHT.png", "plank")]
    [InlineData("left/a.png", "right/a.png", "a")]
    [InlineData("left/left02.png", "right/right02.png", "02")]
    [InlineData("cameraLeft7.png", "cameraRight7.png", "camera_7")]
    [InlineData("LEFT/a.png", "Right/a.pgm", "a")]
    public void Two_names_that_differ_in_left_and_right_alone_are_a_pair(string left, string right, string name)
    {
        using var folder = Folder(left, right);

        var captures = CaptureFolder.Open(folder.Root);

        var capture = Assert.Single(captures.Captures);
        Assert.Equal(name, capture.Name);
        Assert.Equal(folder.Path(left), capture.LeftPath);
        Assert.Equal(folder.Path(right), capture.RightPath);
        Assert.Empty(captures.Unmatched);
    }

    [Fact]
    public void Numbers_count_as_numbers_in_the_order_of_pairs()
    {
        using var folder = Folder([.. new[] { 10, 9, 2, 100 }.SelectMany(i => new[] { $"left_{i}.png", $"right_{i}.png" })]);

        Assert.Equal(["2", "9", "10", "100"], CaptureFolder.Open(folder.Root).Captures.Select(capture => capture.Name));
    }

    [Fact]
    public void Files_without_a_partner_are_named_and_other_files_do_not_matter()
    {
        using var folder = Folder("left_1.png", "right_1.png", "left_2.png", "right_3.png", "leftover.png", "bright_1.png", "notes.txt", "left_4.txt", "overview.png");

        var captures = CaptureFolder.Open(folder.Root);

        Assert.Single(captures.Captures);
        Assert.Equal(["left_2.png", "right_3.png"], captures.Unmatched.AsEnumerable());
    }

    [Fact]
    public void Two_files_that_claim_one_place_are_refused()
    {
        using var folder = Folder("left_1.png", "left_1.tif", "right_1.png");

        var message = Assert.Throws<UserErrorException>(() => CaptureFolder.Open(folder.Root)).Message;

        Assert.Contains("left_1.png", message);
        Assert.Contains("left_1.tif", message);
    }

    [Fact]
    public void A_folder_without_a_pair_says_how_to_name_files()
    {
        using var folder = Folder("left_1.png", "right_2.png");

        var message = Assert.Throws<UserErrorException>(() => StereoPair.ReadFolder(folder.Root)).Message;

        Assert.Contains(folder.Root, message);
        Assert.Contains("left_1.png", message);
        Assert.Contains("left_01.png and right_01.png", message);
    }

    [Fact]
    public void A_missing_folder_is_said_to_be_missing()
    {
        Assert.Contains("nowhere", Assert.Throws<UserErrorException>(() => StereoPair.ReadFolder("nowhere")).Message);
    }

    [Fact]
    public void The_pairs_of_a_folder_are_read_with_their_rig()
    {
        using var folder = new TestFolder();
        Patterns.Picture(10, 8, seed: 1).WritePng(folder.Path("left_1.png"));
        Patterns.Picture(10, 8, seed: 2).WritePng(folder.Path("right_1.png"));
        var camera = new Camera(new(10, 10, 5, 4), new(10, 8));
        var rig = new Rig(camera, camera, new(Matrix3x3.Identity, new(-50, 0, 0)));

        var pair = Assert.Single(StereoPair.ReadFolder(folder.Root, rig));

        Assert.Same(rig, pair.Rig);
        Assert.Equal(Patterns.Picture(10, 8, seed: 2).Grey.ToArray(), pair.Right.Grey.ToArray());
        Assert.Equal(["left_1.png", "right_1.png"], pair.Provenance.Inputs.Select(input => input.Name));
    }

    [Fact]
    public void A_series_tells_what_it_left_out_and_finds_pairs_by_name()
    {
        using var folder = new TestFolder();
        foreach (var name in new[] { "left_a.png", "right_a.png", "left_b.png" })
        {
            Patterns.Picture(10, 8, seed: 1).WritePng(folder.Path(name));
        }

        var series = StereoPair.ReadFolder(folder.Root);

        Assert.Contains("left_b.png", Assert.Single(series.Warnings, warning => warning.Contains("no partner")));
        Assert.Same(series[0], series["a"]);
        Assert.Contains("'z'", Assert.Throws<UserErrorException>(() => series["z"]).Message);
    }

    [Fact]
    public void The_halves_of_a_side_by_side_picture_are_a_pair()
    {
        using var folder = new TestFolder();
        var both = Patterns.Picture(20, 8, 12, seed: 3);
        both.WritePng(folder.Path("both.png"));

        var pair = StereoPair.ReadSideBySide(folder.Path("both.png"), reading: new() { Region = new(0, 0, 5, 8) }, rightReading: new() { Region = new(2, 2, 1, 1) });

        Assert.Equal((new PictureSize(10, 8), new PictureSize(10, 8)), (pair.Left.Size, pair.Right.Size));
        Assert.Equal((both[3, 7], both[13, 7]), (pair.Left[3, 7], pair.Right[3, 7]));
        Assert.Equal((0.5, 1 / 80.0), (pair.Left.Usable!.Share, pair.Right.Usable!.Share));
        Assert.Equal(12, pair.Right.SignificantBits);
    }

    [Fact]
    public void An_odd_width_has_no_two_halves()
    {
        using var folder = new TestFolder();
        Patterns.Picture(21, 8).WritePng(folder.Path("odd.png"));

        Assert.Contains("odd.png", Assert.Throws<UserErrorException>(() => StereoPair.ReadSideBySide(folder.Path("odd.png"))).Message);
    }

    [Fact]
    public void A_capture_list_says_what_belongs_together_and_when_it_was_taken()
    {
        using var folder = new TestFolder();
        foreach (var name in new[] { "a1.png", "b7.png", "left_1.png", "right_1.png" })
        {
            Patterns.Picture(10, 8).WritePng(folder.Path(name));
        }

        folder.Write("captures.csv", "left,right,left_time,right_time\r\na1.png,b7.png,2026-03-05T07:15:30.250Z,2026-03-05T08:15:30.2625+01:00\r\n");
        var captures = CaptureFolder.Open(folder.Root);
        var pair = Assert.Single(StereoPair.ReadFolder(folder.Root));

        Assert.Equal(["left_1.png", "right_1.png"], captures.Unmatched.AsEnumerable());
        Assert.Equal(TimeSpan.FromMilliseconds(12.5), pair.Skew);
        Assert.Contains(pair.Warnings, warning => warning.Contains("12.5 ms") && warning.Contains("left") && warning.Contains("tolerance of 1 ms"));
        Assert.DoesNotContain(pair.WarningsAt(TimeSpan.FromMilliseconds(13)), warning => warning.Contains("ms"));
    }

    [Theory]
    [InlineData("2026-03-05T07:15:30Z", 0.0)]
    [InlineData("2026-03-05T09:45:30.5+02:30", 500.0)]
    [InlineData("2026-03-05T07:15:30.1234567Z", 123.4567)]
    [InlineData("", null)]
    public void Times_with_and_without_fractions_are_read(string time, double? milliseconds)
    {
        using var folder = Folder("a.png", "b.png");
        folder.Write("captures.csv", $"left,right,left_time,right_time\na.png,b.png,{time},\n");

        var read = Assert.Single(CaptureFolder.Open(folder.Root).Captures).LeftTime;

        Assert.Equal(milliseconds, (read - new DateTimeOffset(2026, 3, 5, 7, 15, 30, TimeSpan.Zero))?.TotalMilliseconds);
    }

    [Theory]
    [InlineData("left;right\n", "captures.csv")]
    [InlineData("left,right,left_time,right_time\na.png,b.png\n", "Line 2")]
    [InlineData("left,right\na.png,missing.png\n", "missing.png")]
    [InlineData("left,right,left_time,right_time\na.png,b.png,2026-03-05 07:15,\n", "2026-03-05 07:15")]
    [InlineData("left,right,left_time,right_time\na.png,b.png,2026-03-05T07:15:00,\n", "offset")]
    [InlineData("left,right,left_time,right_time\na.png,b.png,yesterday,\n", "yesterday")]
    public void A_wrong_capture_list_is_refused_by_its_line(string list, string named)
    {
        using var folder = Folder("a.png", "b.png");
        folder.Write("captures.csv", list);

        var message = Assert.Throws<UserErrorException>(() => CaptureFolder.Open(folder.Root)).Message;

        Assert.Contains(named, message);
        Assert.Contains("captures.csv", message);
    }

    private static TestFolder Folder(params string[] names)
    {
        var folder = new TestFolder();
        foreach (var name in names)
        {
            folder.Write(name, "");
        }

        return folder;
    }
}
