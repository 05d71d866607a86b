using System.Buffers.Binary;
using System.Text;
using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Maps_survive_their_files
{
    private static readonly ScalarMap Map = new(new(3, 2), [1.5f, -2.25f, float.NaN, 1e-20f, 3.4e38f, 0f]);

    [Theory]
    [InlineData("map.pfm")]
    [InlineData("map.tif")]
    [InlineData("map.TIFF")]
    public void Floating_point_files_are_exact_with_no_value_as_NaN(string name)
    {
        using var folder = new TestFolder();
        MapFile.Write(Map, folder.Path(name));

        var back = MapFile.Read(folder.Path(name));

        Assert.Equal(Map.Size, back.Size);
        Assert.Equal(Map.Values.ToArray(), back.Values.ToArray());
    }

    // Source: netpbm's manual page pfm(5) for the header and the byte orders; bottom row first as OpenCV has it, checked below.
    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void A_portable_float_map_typed_byte_by_byte_is_read_in_both_byte_orders(bool littleEndian)
    {
        using var folder = new TestFolder();
        float[] bottomFirst = [3, 4, 1, 2];
        var body = new byte[16];
        for (var i = 0; i < 4; i++)
        {
            var place = body.AsSpan(4 * i);
            if (littleEndian)
            {
                BinaryPrimitives.WriteSingleLittleEndian(place, bottomFirst[i]);
            }
            else
            {
                BinaryPrimitives.WriteSingleBigEndian(place, bottomFirst[i]);
            }
        }

        var path = folder.Write("typed.pfm", [.. Encoding.ASCII.GetBytes($"Pf\n2 2\n{(littleEndian ? "-" : "")}0.5\n"), .. body]);

        Assert.Equal([1f, 2, 3, 4], MapFile.Read(path).Values.ToArray());
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void Both_byte_orders_are_written_alike(bool littleEndian)
    {
        Assert.Equal(Map.Values.ToArray(), PfmFormat.Decode(PfmFormat.Encode(Map, littleEndian), "map.pfm").Values.ToArray());
    }

    // Source: OpenCV's own reader of the same files.
    [Theory]
    [InlineData("map.pfm")]
    [InlineData("map.tif")]
    public void OpenCV_reads_the_same_numbers(string name)
    {
        using var folder = new TestFolder();
        MapFile.Write(Map, folder.Path(name));

        using var seen = Cv2.ImRead(folder.Path(name), ImreadModes.Unchanged);

        Assert.Equal(MatType.CV_32FC1, seen.Type());
        Assert.Equal(Map.Values.ToArray(), seen.AsSpan<float>().ToArray());
    }

    [Fact]
    public void A_sixteen_bit_png_holds_value_times_factor_and_zero_for_no_value()
    {
        using var folder = new TestFolder();
        MapFile.Write(new(new(3, 1), [1.25f, float.NaN, 100.001f]), folder.Path("map.png"), pngFactor: 256);

        using var seen = Cv2.ImRead(folder.Path("map.png"), ImreadModes.Unchanged);
        var back = MapFile.Read(folder.Path("map.png"), pngFactor: 256);

        Assert.Equal([320, 0, 25600], seen.AsSpan<ushort>().ToArray().Select(level => (int)level));
        Assert.Equal([1.25f, float.NaN, 100f], back.Values.ToArray());
    }

    [Theory]
    [InlineData(-1f)]
    [InlineData(0f)]
    [InlineData(0.001f)]
    [InlineData(256.1f)]
    [InlineData(float.PositiveInfinity)]
    public void A_value_that_does_not_fit_into_a_png_is_refused_and_leaves_no_file(float value)
    {
        using var folder = new TestFolder();

        var message = Assert.Throws<UserErrorException>(() => MapFile.Write(new(new(2, 1), [5, value]), folder.Path("map.png"))).Message;

        Assert.Contains("map.png", message);
        Assert.Contains("column 1 of row 0", message);
        Assert.Empty(Directory.GetFiles(folder.Root));
    }

    // Source: the Aloe pair's true disparity in Debian's package opencv-doc: 8 bits, whole pixels at the stored size, 0 for none.
    [SkippableFact]
    public void A_published_true_disparity_is_read_with_its_holes()
    {
        var truth = MapFile.Read(OpenData.Find("aloe/aloeGT.png"), pngFactor: 1);

        Assert.Equal(new PictureSize(1282, 1110), truth.Size);
        Assert.InRange(truth.ValidShare, 0.8, 0.999);
    }

    [Fact]
    public void Infinity_in_a_portable_float_map_means_no_value()
    {
        var encoded = PfmFormat.Encode(new(new(1, 1), [float.PositiveInfinity]));
        Assert.True(float.IsNaN(PfmFormat.Decode(encoded, "map.pfm")[0, 0]));
    }

    [Theory]
    [InlineData("map.pfm", "Pf\n2 2\n-1\nabc", "cut short")]
    [InlineData("map.pfm", "PF\n2 2\n-1\nabc", "three channels")]
    [InlineData("map.pfm", "Pf\n40000 40000\n-1\n", "40000 × 40000")]
    [InlineData("map.pfm", "Pf\n2 two\n-1\n", "header")]
    [InlineData("map.pfm", "a text", "header")]
    [InlineData("map.tif", "a text", "text file")]
    [InlineData("map.png", "a text", "text file")]
    [InlineData("map.xyz", "a text", ".pfm")]
    public void A_broken_map_is_refused_by_name(string name, string content, string reason)
    {
        using var folder = new TestFolder();
        var path = folder.Write(name, content);

        var message = Assert.Throws<UserErrorException>(() => MapFile.Read(path)).Message;

        Assert.Contains(path, message);
        Assert.Contains(reason, message);
    }

    [Fact]
    public void A_colour_picture_and_a_picture_of_levels_are_no_maps()
    {
        using var folder = new TestFolder();
        Patterns.Picture(4, 4, colour: true).WritePng(folder.Path("colour.png"));
        folder.Write("levels.tif", Patterns.Tiff(2, 2, 8, new byte[4]));

        Assert.Contains("colour.png", Assert.Throws<UserErrorException>(() => MapFile.Read(folder.Path("colour.png"))).Message);
        Assert.Contains("levels.tif", Assert.Throws<UserErrorException>(() => MapFile.Read(folder.Path("levels.tif"))).Message);
    }
}
