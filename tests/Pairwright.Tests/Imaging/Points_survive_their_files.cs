using System.Text;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Xunit;

namespace Pairwright.Tests.Imaging;

public class Points_survive_their_files
{
    private static readonly Vector3D[] Points = [new(1.5, -2, 1000.25), new(float.MinValue, 0, 1e-3f), new(double.NaN, 7, 8)];

    [Theory]
    [InlineData(false, false)]
    [InlineData(true, false)]
    [InlineData(false, true)]
    [InlineData(true, true)]
    public void Points_with_and_without_colours_and_uncertainty_come_back(bool colours, bool sigma)
    {
        using var folder = new TestFolder();
        byte[] rgb = colours ? [1, 2, 3, 4, 5, 6, 255, 254, 253] : [];
        float[] sigmas = sigma ? [0.5f, 0.25f, float.NaN] : [];
        PointFile.Write(folder.Path("cloud.ply"), Points, rgb, sigmas, "in the left camera's frame");

        var back = PointFile.Read(folder.Path("cloud.ply"));

        Assert.Equal(Points, back.Positions);
        Assert.Equal(rgb, back.Rgb);
        Assert.Equal(sigmas, back.SigmaMm);
    }

    // Source: Turk's description of the polygon file format (1994), from memory; the expected bytes are typed out.
    [Fact]
    public void The_bytes_are_those_of_the_format()
    {
        using var folder = new TestFolder();
        PointFile.Write(folder.Path("one.ply"), [new(1, 2, -1)], [9, 8, 7], [0.5f]);

        byte[] expected =
        [
            .. Encoding.ASCII.GetBytes(
                "ply\nformat binary_little_endian 1.0\ncomment lengths in millimetres\nelement vertex 1\n"
                + "property float x\nproperty float y\nproperty float z\nproperty uchar red\nproperty uchar green\nproperty uchar blue\nproperty float sigma\nend_header\n"),
            0, 0, 0x80, 0x3F, 0, 0, 0, 0x40, 0, 0, 0x80, 0xBF, 9, 8, 7, 0, 0, 0, 0x3F,
        ];
        Assert.Equal(expected, File.ReadAllBytes(folder.Path("one.ply")));
    }

    [Fact]
    public void A_typed_text_file_with_other_properties_and_faces_is_read_in_its_unit()
    {
        using var folder = new TestFolder();
        var path = folder.Write(
            "typed.ply",
            "ply\nformat ascii 1.0\nelement vertex 2\nproperty double z\nproperty float nx\nproperty double y\nproperty double x\nelement face 1\nproperty list uchar int vertex_indices\nend_header\n"
            + "3 0 2 1\n6e0 0 5 -4.5\n3 0 1 0\n");

        var back = PointFile.Read(path, LengthUnit.Metre);

        Assert.Equal([new(1000, 2000, 3000), new(-4500, 5000, 6000)], back.Positions.AsEnumerable());
        Assert.Empty(back.Rgb);
    }

    [Fact]
    public void Big_endian_files_are_read()
    {
        using var folder = new TestFolder();
        byte[] content =
        [
            .. "ply\nformat binary_big_endian 1.0\nelement vertex 1\nproperty short x\nproperty int y\nproperty double z\nend_header\n"u8,
            0xFF, 0xFE, 0, 0, 1, 0, 0x40, 0x08, 0, 0, 0, 0, 0, 0,
        ];

        Assert.Equal([new(-2, 256, 3)], PointFile.Read(folder.Write("big.ply", content)).Positions.AsEnumerable());
    }

    [Theory]
    [InlineData("hello", "no PLY")]
    [InlineData("ply\nformat ascii 1.0\nelement vertex 2\nproperty float x\nproperty float y\nproperty float z\nend_header\n1 2 3\n4 5", "cut short")]
    [InlineData("ply\nformat binary_little_endian 1.0\nelement vertex 2000000000\nproperty float x\nproperty float y\nproperty float z\nend_header\n1 2 3\n4 5", "cut short")]
    [InlineData("ply\nformat ascii 1.0\nelement vertex 1\nproperty float x\nproperty float y\nproperty float z\nend_header\n1 two 3\n", "'two'")]
    [InlineData("ply\nformat ascii 1.0\nelement vertex 1\nproperty float x\nproperty float y\nend_header\n1 2\n", "x, y and z")]
    [InlineData("ply\nformat ascii 1.0\nelement vertex 1\nproperty half x\nend_header\n1\n", "half")]
    [InlineData("ply\nformat ascii 1.0\nelement face 1\nproperty float x\nend_header\n1\n", "element face")]
    [InlineData("ply\nformat gzip 1.0\nelement vertex 1\nproperty float x\nend_header\n1\n", "gzip")]
    public void A_broken_file_is_refused_by_name(string content, string reason)
    {
        using var folder = new TestFolder();
        var path = folder.Write("broken.ply", content);

        var message = Assert.Throws<UserErrorException>(() => PointFile.Read(path)).Message;

        Assert.Contains(path, message);
        Assert.Contains(reason, message);
    }
}
