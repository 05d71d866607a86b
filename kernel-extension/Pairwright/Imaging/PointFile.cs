using System.Buffers.Binary;
using System.Globalization;
using System.Text;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Writes and reads points as PLY (Turk 1994, the polygon file format).</summary>
/// <remarks>
/// Written are binary little-endian files with the vertex properties <c>x y z</c> (float, millimetres), <c>red green blue</c> (uchar) where
/// there are colours, and <c>sigma</c> (float, millimetres, 1 σ) where it is known. Read are text and both byte orders, with any further
/// scalar properties skipped.
/// </remarks>
public static class PointFile
{
    private static readonly string[] Colours = ["red", "green", "blue"];

    /// <summary>Writes points.</summary>
    /// <param name="path">The file, replaced only when the new one is whole.</param>
    /// <param name="positions">The points, in millimetres; stored in single precision.</param>
    /// <param name="rgb">Red, green, blue by turns, three bytes a point; empty for none.</param>
    /// <param name="sigmaMm">The standard uncertainty of each point, in millimetres; empty for none.</param>
    /// <param name="comment">A line for the file's head, such as the frame of the points.</param>
    /// <exception cref="ArgumentException">The numbers of points, colours and uncertainties do not fit.</exception>
    /// <exception cref="UserErrorException">The file cannot be written.</exception>
    public static void Write(string path, ReadOnlySpan<Vector3D> positions, ReadOnlySpan<byte> rgb = default, ReadOnlySpan<float> sigmaMm = default, string comment = "")
    {
        ArgumentNullException.ThrowIfNull(comment);
        if ((!rgb.IsEmpty && rgb.Length != 3 * positions.Length) || (!sigmaMm.IsEmpty && sigmaMm.Length != positions.Length))
        {
            throw new ArgumentException($"{positions.Length} points take {3 * positions.Length} colour bytes and {positions.Length} uncertainties, not {rgb.Length} and {sigmaMm.Length}.");
        }

        var head = new StringBuilder("ply\nformat binary_little_endian 1.0\ncomment lengths in millimetres\n");
        if (comment.Length > 0)
        {
            head.Append(CultureInfo.InvariantCulture, $"comment {comment.ReplaceLineEndings(" ")}\n");
        }

        head.Append(CultureInfo.InvariantCulture, $"element vertex {positions.Length}\nproperty float x\nproperty float y\nproperty float z\n");
        head.Append(rgb.IsEmpty ? "" : "property uchar red\nproperty uchar green\nproperty uchar blue\n");
        head.Append(sigmaMm.IsEmpty ? "" : "property float sigma\n").Append("end_header\n");

        var header = Encoding.UTF8.GetBytes(head.ToString());
        var record = 12 + (rgb.IsEmpty ? 0 : 3) + (sigmaMm.IsEmpty ? 0 : 4);
        var body = new byte[(long)record * positions.Length];
        for (var i = 0; i < positions.Length; i++)
        {
            var point = body.AsSpan(i * record, record);
            BinaryPrimitives.WriteSingleLittleEndian(point, (float)positions[i].X);
            BinaryPrimitives.WriteSingleLittleEndian(point[4..], (float)positions[i].Y);
            BinaryPrimitives.WriteSingleLittleEndian(point[8..], (float)positions[i].Z);
            if (!rgb.IsEmpty)
            {
                rgb.Slice(3 * i, 3).CopyTo(point[12..]);
            }

            if (!sigmaMm.IsEmpty)
            {
                BinaryPrimitives.WriteSingleLittleEndian(point[^4..], sigmaMm[i]);
            }
        }

        AtomicFile.Write(path, stream =>
        {
            stream.Write(header);
            stream.Write(body);
        });
    }

    /// <summary>Reads points.</summary>
    /// <param name="path">The file.</param>
    /// <param name="lengths">The unit of the file's positions and uncertainties, which PLY does not state.</param>
    /// <exception cref="UserErrorException">The file is missing, no PLY, lacks positions, or is cut short.</exception>
    public static StoredPoints Read(string path, LengthUnit lengths = LengthUnit.Millimetre)
    {
        var content = PictureFile.ReadAll(path);
        var header = PlyHeader.Read(content, path);
        var unit = YamlHeader.MillimetresPer(lengths);
        var x = header.Place("x");
        var y = header.Place("y");
        var z = header.Place("z");
        if (x < 0 || y < 0 || z < 0)
        {
            throw new UserErrorException($"'{path}' has no vertices with the properties x, y and z; export points as PLY.");
        }

        var colours = Colours.Select(header.Place).ToArray();
        var hasColours = colours.All(place => place >= 0 && header.Properties[place].Type == PlyType.UInt8);
        var sigma = header.Place("sigma");
        var positions = new Vector3D[header.Count];
        var rgb = new byte[hasColours ? 3 * header.Count : 0];
        var sigmas = new float[sigma >= 0 ? header.Count : 0];
        var values = new double[header.Properties.Count];
        var at = header.BodyAt;
        for (var i = 0; i < header.Count; i++)
        {
            header.ReadVertex(content, ref at, values, path);
            positions[i] = new(unit * values[x], unit * values[y], unit * values[z]);
            for (var channel = 0; hasColours && channel < 3; channel++)
            {
                rgb[3 * i + channel] = (byte)values[colours[channel]];
            }

            if (sigma >= 0)
            {
                sigmas[i] = (float)(unit * values[sigma]);
            }
        }

        return new([.. positions], [.. rgb], [.. sigmas]);
    }
}
