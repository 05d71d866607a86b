using System.Text;
using OpenCvSharp;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Broken_pictures_are_refused_in_one_sentence
{
    [Fact]
    public void A_missing_file()
    {
        using var folder = new TestFolder();
        Assert.Contains("does not exist", Refusal(folder.Path("none.png")));
    }

    [Fact]
    public void A_folder_instead_of_a_file()
    {
        using var folder = new TestFolder();
        Assert.Contains("folder", Refusal(folder.Root));
    }

    [Theory]
    [InlineData("These are not the pixels that you wanted.\n", "text file")]
    [InlineData("", "empty")]
    [InlineData("P5 is what this sentence begins with", "cut short")]
    [InlineData("Programme\n", "text file")]
    public void A_text_file_that_is_named_like_a_picture(string text, string reason)
    {
        using var folder = new TestFolder();
        Assert.Contains(reason, Refusal(folder.Write("note.png", text)));
    }

    // Every format, cut at many places: the codec alone would fill the rest with grey or black without a word.
    [Theory]
    [InlineData(".png")]
    [InlineData(".jpg")]
    [InlineData(".tiff")]
    [InlineData(".bmp")]
    [InlineData(".pgm")]
    public void A_file_that_is_cut_short(string ending)
    {
        using var folder = new TestFolder();
        using var mat = Mat.FromPixelData(40, 60, MatType.CV_8UC1, Array.ConvertAll(Patterns.Levels(40 * 60, 256, 9), level => (byte)level));
        var whole = mat.ImEncode(ending);
        Assert.Equal(60, Picture.Read(folder.Write("whole" + ending, whole)).Size.Width);

        foreach (var length in Enumerable.Range(1, 40).Select(part => whole.Length * part / 41).Append(whole.Length - 1))
        {
            Refusal(folder.Write($"cut{ending}", whole[..length]));
        }
    }

    [Fact]
    public void A_png_with_one_wrong_byte()
    {
        using var folder = new TestFolder();
        var content = PictureCodec.EncodePng(new(50, 50), new byte[2500]);
        content[content.Length / 2] ^= 1;
        Assert.Contains("check sum", Refusal(folder.Write("bit.png", content)));
    }

    // Headers only: nothing of the stated size is ever made.
    [Theory]
    [InlineData(".png")]
    [InlineData(".jpg")]
    [InlineData(".tif")]
    [InlineData(".bmp")]
    [InlineData(".pgm")]
    public void A_header_of_forty_thousand_by_forty_thousand(string ending)
    {
        using var folder = new TestFolder();
        const int side = 40_000;
        byte[] content = ending switch
        {
            ".png" => [0x89, .. "PNG\r\n\u001a\n"u8, 0, 0, 0, 13, .. "IHDR"u8, 0, 0, 0x9C, 0x40, 0, 0, 0x9C, 0x40, 8, 0, 0, 0, 0, 0, 0, 0, 0],
            ".jpg" => [0xFF, 0xD8, 0xFF, 0xC0, 0, 11, 8, 0x9C, 0x40, 0x9C, 0x40, 1, 1, 0x11, 0],
            ".tif" => Patterns.Tiff(side, side, 8, []),
            ".bmp" => [.. "BM"u8, 0, 0, 0, 0, 0, 0, 0, 0, 54, 0, 0, 0, 40, 0, 0, 0, .. BitConverter.GetBytes(side), .. BitConverter.GetBytes(side), 1, 0, 8, 0, .. new byte[24]],
            _ => Encoding.ASCII.GetBytes($"P5\n{side} {side}\n255\n"),
        };

        var before = GC.GetAllocatedBytesForCurrentThread();
        Assert.Contains("40000 × 40000", Refusal(folder.Write("huge" + ending, content)));
        Assert.True(GC.GetAllocatedBytesForCurrentThread() - before < 10_000_000);
    }

    [Theory]
    [InlineData("P2\n2 2\n255\n1 2 3\n")]
    [InlineData("P2\n2 2\n255\n1 2 3 four\n")]
    [InlineData("P2\n2 2\n255\n1 2 3 256\n")]
    [InlineData("P2\n2 2\n70000\n1 2 3 4\n")]
    [InlineData("P2\n0 2\n255\n")]
    [InlineData("P2\n99999999999999999999 99999999999999999999\n255\n")]
    public void A_portable_map_with_wrong_numbers(string text)
    {
        using var folder = new TestFolder();
        Refusal(folder.Write("typed.pgm", text));
    }

    [Fact]
    public void A_tiff_that_points_past_its_end()
    {
        using var folder = new TestFolder();
        var content = Patterns.Tiff(4, 4, 8, new byte[16]);
        content[4] = 0xF0;
        Refusal(folder.Write("wild.tif", content));
    }

    // Found by trying: OpenCV alone reads these as black pictures. Numbers of compressions from TIFF revision 6.0 and its supplements.
    [Theory]
    [InlineData(1, 8)]
    [InlineData(5, 8)]
    [InlineData(5, 16)]
    [InlineData(8, 8)]
    [InlineData(8, 16)]
    [InlineData(32946, 8)]
    [InlineData(32773, 8)]
    [InlineData(7, 8)]
    [InlineData(4, 8)]
    [InlineData(999, 8)]
    [InlineData(50000, 8)]
    public void A_tiff_whose_pixels_do_not_unpack(int compression, int bits)
    {
        using var folder = new TestFolder();
        var noise = new byte[500];
        new Random(3).NextBytes(noise);
        Assert.Contains("cannot be decoded", Refusal(folder.Write("noise.tif", Patterns.Tiff(40, 40, bits, noise, compression: compression))));
    }

    [Fact]
    public void A_tiff_that_stores_white_as_zero_in_sixteen_bits()
    {
        using var folder = new TestFolder();
        Assert.Contains("white as zero", Refusal(folder.Write("white.tif", Patterns.Tiff(2, 2, 16, new byte[8], photometric: 0))));
    }

    [Fact]
    public void A_float_tiff_where_a_picture_is_wanted()
    {
        using var folder = new TestFolder();
        MapFile.Write(new(new(2, 1), [1, 2]), folder.Path("map.tif"));
        Assert.Contains("MapFile.Read", Refusal(folder.Path("map.tif")));
    }

    [Fact]
    public void A_mosaic_pattern_for_a_colour_file()
    {
        using var folder = new TestFolder();
        Patterns.Picture(6, 6, colour: true).WritePng(folder.Path("colour.png"));
        var fault = Assert.Throws<UserErrorException>(() => Picture.Read(folder.Path("colour.png"), new() { Bayer = BayerPattern.Rggb }));
        Assert.Contains("colour.png", fault.Message);
    }

    // Random bytes behind a valid beginning must end in a sentence, never in another exception.
    [Fact]
    public void Any_file_of_random_bytes()
    {
        using var folder = new TestFolder();
        var random = new Random(20260305);
        byte[][] beginnings = [[], [0x89, .. "PNG\r\n\u001a\n"u8], [0xFF, 0xD8, 0xFF], [.. "II*\0"u8], [.. "MM\0*"u8], [.. "BM"u8], [.. "P5\n"u8], [.. "II+\0"u8]];
        for (var trial = 0; trial < 400; trial++)
        {
            var tail = new byte[random.Next(200)];
            random.NextBytes(tail);
            Refusal(folder.Write("random.png", [.. beginnings[trial % beginnings.Length], .. tail]));
        }
    }

    // One to three wrong bytes in a good file: it is read or refused, and nothing else happens.
    [Theory]
    [InlineData(".png")]
    [InlineData(".jpg")]
    [InlineData(".tiff")]
    [InlineData(".bmp")]
    [InlineData(".ppm")]
    public void A_file_with_a_few_wrong_bytes_is_read_or_refused(string ending)
    {
        using var folder = new TestFolder();
        using var mat = Mat.FromPixelData(6, 5, MatType.CV_8UC3, Array.ConvertAll(Patterns.Levels(90, 256, 9), level => (byte)level));
        var whole = mat.ImEncode(ending);
        var random = new Random(7);
        var refused = 0;
        for (var trial = 0; trial < 300; trial++)
        {
            var content = (byte[])whole.Clone();
            for (var i = random.Next(3); i >= 0; i--)
            {
                content[random.Next(content.Length)] = (byte)random.Next(256);
            }

            var path = folder.Write($"wrong{ending}", content);
            try
            {
                Picture.Read(path);
            }
            catch (UserErrorException fault)
            {
                Assert.Contains($"'{path}'", fault.Message);
                refused++;
            }
        }

        Assert.InRange(refused, 1, 300);
    }

    private static string Refusal(string path)
    {
        var message = Assert.Throws<UserErrorException>(() => Picture.Read(path)).Message;
        Assert.Contains($"'{path}'", message);
        Assert.EndsWith(".", message);
        return message;
    }
}
