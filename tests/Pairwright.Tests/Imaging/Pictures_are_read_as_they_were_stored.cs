using System.Text;
using OpenCvSharp;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Pictures_are_read_as_they_were_stored
{
    // Source: OpenCV's encoders wrote the files; lossless formats have to give the levels back.
    [Theory]
    [InlineData(".png", 8)]
    [InlineData(".png", 16)]
    [InlineData(".tiff", 8)]
    [InlineData(".tiff", 16)]
    [InlineData(".bmp", 8)]
    [InlineData(".pgm", 8)]
    [InlineData(".pgm", 16)]
    public void Lossless_grey_files_give_every_level_back(string ending, int bits)
    {
        using var folder = new TestFolder();
        var levels = Patterns.Levels(23 * 17, 1 << bits, seed: bits);
        using var mat = bits == 8
            ? Mat.FromPixelData(17, 23, MatType.CV_8UC1, Array.ConvertAll(levels, level => (byte)level))
            : Mat.FromPixelData(17, 23, MatType.CV_16UC1, levels);

        var picture = Picture.Read(folder.Write("grey" + ending, mat.ImEncode(ending)));

        Assert.Equal(new PictureSize(23, 17), picture.Size);
        Assert.Equal(bits, picture.SignificantBits);
        Assert.Equal((1 << bits) - 1, picture.SaturationLevel);
        Assert.Equal(levels, picture.Grey.ToArray());
        Assert.False(picture.HasColour && ending != ".bmp");
    }

    // Source: OpenCV's encoders and its own decoding; grey by ITU-R BT.601 within rounding of the exact weights.
    [Theory]
    [InlineData(".png", 8)]
    [InlineData(".png", 16)]
    [InlineData(".tiff", 8)]
    [InlineData(".bmp", 8)]
    [InlineData(".ppm", 8)]
    [InlineData(".ppm", 16)]
    [InlineData(".jpg", 8)]
    public void Colour_files_keep_their_colours_and_become_grey_by_the_weights_of_Rec_601(string ending, int bits)
    {
        using var folder = new TestFolder();
        var bgr = Patterns.Levels(3 * 20 * 10, 1 << bits, seed: 3);
        using var mat = bits == 8
            ? Mat.FromPixelData(10, 20, MatType.CV_8UC3, Array.ConvertAll(bgr, level => (byte)level))
            : Mat.FromPixelData(10, 20, MatType.CV_16UC3, bgr);
        var content = mat.ImEncode(ending);
        using var decoded = Cv2.ImDecode(content, ImreadModes.Unchanged);
        using var wide = new Mat();
        decoded.ConvertTo(wide, MatType.CV_16UC3);
        var expected = wide.AsSpan<Vec3w>().ToArray();

        var picture = Picture.Read(folder.Write("colour" + ending, content));

        Assert.True(picture.HasColour);
        for (var i = 0; i < expected.Length; i++)
        {
            Assert.Equal((expected[i].Item2, expected[i].Item1, expected[i].Item0), (picture.Colour[3 * i], picture.Colour[3 * i + 1], picture.Colour[3 * i + 2]));
            var luma = 0.299 * expected[i].Item2 + 0.587 * expected[i].Item1 + 0.114 * expected[i].Item0;
            Assert.InRange(picture.Grey[i] - luma, -0.5001, 0.5001);
        }
    }

    [SkippableFact]
    public void A_real_jpeg_gives_the_levels_that_OpenCV_decodes()
    {
        var path = OpenData.Find("boards/left01.jpg");
        using var reference = Cv2.ImRead(path, ImreadModes.Grayscale | ImreadModes.IgnoreOrientation);

        Assert.Equal(reference.AsSpan<byte>().ToArray().Select(level => (ushort)level), Picture.Read(path).Grey.ToArray());
    }

    // Source: the netpbm formats' manual pages; the files are typed out by hand.
    [Fact]
    public void A_typed_portable_grey_map_with_comments_is_read()
    {
        using var folder = new TestFolder();
        var picture = Picture.Read(folder.Write("typed.pgm", "P2 # a comment\n# another\n3 2\n1023\n0 1 2\n1021 1022 1023\n"));

        Assert.Equal([0, 1, 2, 1021, 1022, 1023], picture.Grey.ToArray().Select(level => (int)level));
        Assert.Equal((10, 1023), (picture.SignificantBits, picture.SaturationLevel));
    }

    [Fact]
    public void A_binary_portable_grey_map_holds_big_endian_levels_up_to_its_largest()
    {
        using var folder = new TestFolder();
        byte[] content = [.. Encoding.ASCII.GetBytes("P5\n2 1\n4095\n"), 0x0F, 0xFF, 0x01, 0x02];

        var picture = Picture.Read(folder.Write("twelve.pgm", content));

        Assert.Equal([0x0FFF, 0x0102], picture.Grey.ToArray().Select(level => (int)level));
        Assert.Equal(12, picture.SignificantBits);
        Assert.Empty(picture.ReadingWarnings);
    }

    [Fact]
    public void A_portable_map_whose_largest_level_is_no_power_of_two_saturates_there()
    {
        using var folder = new TestFolder();
        var picture = Picture.Read(folder.Write("odd.pgm", "P2\n2 1\n1000\n1000 7\n"));

        Assert.Equal((10, 1000), (picture.SignificantBits, picture.SaturationLevel));
        Assert.Equal(0.5, picture.SaturatedShare);
    }

    // Source: TIFF revision 6.0; the file is typed byte by byte.
    [Fact]
    public void Twelve_packed_bits_of_a_tiff_come_out_as_twelve_bits()
    {
        using var folder = new TestFolder();
        int[] levels = [0x123, 0xFFF, 0x001, 0x800];
        byte[] packed = [0x12, 0x3F, 0xFF, 0x00, 0x18, 0x00];

        var picture = Picture.Read(folder.Write("packed.tif", Patterns.Tiff(4, 1, 12, packed)));

        Assert.Equal(levels, picture.Grey.ToArray().Select(level => (int)level));
        Assert.Equal(12, picture.SignificantBits);
    }

    [Theory]
    [InlineData(9, false)]
    [InlineData(10, true)]
    [InlineData(12, false)]
    [InlineData(14, true)]
    [InlineData(16, false)]
    [InlineData(8, true)]
    public void A_picture_that_was_written_comes_back_with_its_levels_and_significant_bits(int bits, bool colour)
    {
        using var folder = new TestFolder();
        var picture = Patterns.Picture(31, 8, bits, seed: bits, colour);
        picture.WritePng(folder.Path("own.png"));

        var back = Picture.Read(folder.Path("own.png"));

        Assert.Equal(bits, back.SignificantBits);
        Assert.Equal(picture.Colour.ToArray(), back.Colour.ToArray());
        if (!colour)
        {
            Assert.Equal(picture.Grey.ToArray(), back.Grey.ToArray());
        }
    }

    // Source: W3C PNG, third edition, 11.3.2.7: sBIT tells the bits; OpenCV, which ignores it, sees levels scaled to the full range.
    [Fact]
    public void Other_programs_see_a_written_twelve_bit_picture_at_full_range()
    {
        using var folder = new TestFolder();
        new Picture(new(2, 1), [4095, 0], 12).WritePng(folder.Path("full.png"));

        using var seen = Cv2.ImRead(folder.Path("full.png"), ImreadModes.Unchanged);

        Assert.Equal([65535, 0], seen.AsSpan<ushort>().ToArray().Select(level => (int)level));
    }

    [Fact]
    public void Twelve_bits_in_the_lower_part_of_a_sixteen_bit_file_are_believed_when_stated()
    {
        using var folder = new TestFolder();
        var levels = Patterns.Levels(64, 4096, seed: 5);
        var path = Sixteen(folder, levels);

        var stated = Picture.Read(path, new() { SignificantBits = 12, SaturationLevel = 4000 });
        var silent = Picture.Read(path);

        Assert.Equal(levels, stated.Grey.ToArray());
        Assert.Equal((12, 4000), (stated.SignificantBits, stated.SaturationLevel));
        Assert.Empty(stated.ReadingWarnings);
        Assert.Equal(16, silent.SignificantBits);
        Assert.Contains("significant bits", Assert.Single(silent.ReadingWarnings));
    }

    [Fact]
    public void Twelve_bits_in_the_upper_part_of_a_sixteen_bit_file_are_noticed_and_brought_down_when_stated()
    {
        using var folder = new TestFolder();
        var levels = Patterns.Levels(64, 4096, seed: 6);
        var path = Sixteen(folder, Array.ConvertAll(levels, level => (ushort)(level << 4)));

        var stated = Picture.Read(path, new() { SignificantBits = 12 });
        var silent = Picture.Read(path);

        Assert.Equal(levels, stated.Grey.ToArray());
        Assert.Contains("divided by 16", Assert.Single(stated.ReadingWarnings));
        Assert.Equal(16, silent.SignificantBits);
        Assert.Contains("multiples of 16", Assert.Single(silent.ReadingWarnings));
    }

    [Fact]
    public void Fewer_bits_than_the_levels_need_are_refused()
    {
        using var folder = new TestFolder();
        var path = Sixteen(folder, [5000, 4999, 17, 3]);

        var fault = Assert.Throws<UserErrorException>(() => Picture.Read(path, new() { SignificantBits = 12 }));

        Assert.Contains(path, fault.Message);
        Assert.Contains("5000", fault.Message);
    }

    [Fact]
    public void More_bits_than_the_file_stores_are_refused()
    {
        using var folder = new TestFolder();
        Patterns.Picture(4, 4).WritePng(folder.Path("eight.png"));

        Assert.Contains("eight.png", Assert.Throws<UserErrorException>(() => Picture.Read(folder.Path("eight.png"), new() { SignificantBits = 12 })).Message);
    }

    // A mosaic of a plain colour has to give that colour everywhere, whichever corner the pattern begins with.
    [Theory]
    [InlineData(BayerPattern.Rggb, "RGGB")]
    [InlineData(BayerPattern.Grbg, "GRBG")]
    [InlineData(BayerPattern.Gbrg, "GBRG")]
    [InlineData(BayerPattern.Bggr, "BGGR")]
    public void A_mosaic_of_one_colour_gives_that_colour(BayerPattern pattern, string order)
    {
        using var folder = new TestFolder();
        var size = new PictureSize(12, 10);
        var mosaic = new ushort[size.Area];
        for (var v = 0; v < size.Height; v++)
        {
            for (var u = 0; u < size.Width; u++)
            {
                mosaic[v * size.Width + u] = order[v % 2 * 2 + u % 2] switch { 'R' => 3000, 'G' => 2000, _ => 500 };
            }
        }

        new Picture(size, mosaic, 12).WritePng(folder.Path("mosaic.png"));
        var picture = Picture.Read(folder.Path("mosaic.png"), new() { Bayer = pattern });

        for (var i = 0; i < size.Area; i++)
        {
            Assert.Equal((3000, 2000, 500), (picture.Colour[3 * i], picture.Colour[3 * i + 1], picture.Colour[3 * i + 2]));
            Assert.Equal(2128, picture.Grey[i]); // 0.299 · 3000 + 0.587 · 2000 + 0.114 · 500
        }
    }

    [Fact]
    public void A_region_and_a_mask_picture_limit_what_may_be_used()
    {
        using var folder = new TestFolder();
        Patterns.Picture(8, 6).WritePng(folder.Path("picture.png"));
        new Picture(new(8, 6), [.. Enumerable.Range(0, 48).Select(i => (ushort)(i % 8 == 2 ? 0 : 255))]).WritePng(folder.Path("mask.png"));

        var picture = Picture.Read(folder.Path("picture.png"), new() { Region = new(1, 1, 3, 2), Mask = Mask.Read(folder.Path("mask.png")) });

        Assert.Equal(4 / 48.0, picture.Usable!.Share, 12);
        Assert.True(picture.Usable[1, 1] && picture.Usable[3, 2]);
        Assert.False(picture.Usable[2, 1] || picture.Usable[4, 1] || picture.Usable[1, 3]);
    }

    [Fact]
    public void A_region_over_the_edge_and_a_mask_of_another_size_are_refused()
    {
        using var folder = new TestFolder();
        Patterns.Picture(8, 6).WritePng(folder.Path("picture.png"));

        Assert.Throws<UserErrorException>(() => Picture.Read(folder.Path("picture.png"), new() { Region = new(6, 0, 3, 2) }));
        var fault = Assert.Throws<UserErrorException>(() => Picture.Read(folder.Path("picture.png"), new() { Mask = new(new(2, 2), new bool[4]) }));
        Assert.Contains("picture.png", fault.Message);
    }

    [Fact]
    public void The_provenance_names_the_file_and_its_hash()
    {
        using var folder = new TestFolder();
        var path = folder.Write("abc.pgm", "P2\n1 1\n255\n7\n");

        Assert.Equal(Provenance.OfFile(path), Picture.Read(path).Provenance);
    }

    [Fact]
    public void What_the_caller_told_stands_in_the_provenance()
    {
        using var folder = new TestFolder();
        var path = Sixteen(folder, [1, 2, 3, 4]);

        Assert.Equal("sixteen.png → read (12 significant bits, saturated at 4000)", Picture.Read(path, new() { SignificantBits = 12, SaturationLevel = 4000 }).Provenance.ToString());
    }

    [Theory]
    [InlineData(8, 256, null)]
    [InlineData(10, 1024, null)]
    [InlineData(10, 7, 1024)]
    [InlineData(10, 7, 0)]
    [InlineData(7, 7, null)]
    [InlineData(17, 7, null)]
    public void Levels_that_do_not_fit_the_bits_are_refused(int bits, int level, int? saturation)
    {
        Assert.Throws<UserErrorException>(() => new Picture(new(1, 1), [(ushort)level], bits, saturation));
    }

    private static string Sixteen(TestFolder folder, ushort[] levels)
    {
        using var mat = Mat.FromPixelData(1, levels.Length, MatType.CV_16UC1, levels);
        return folder.Write("sixteen.png", mat.ImEncode(".png"));
    }
}
