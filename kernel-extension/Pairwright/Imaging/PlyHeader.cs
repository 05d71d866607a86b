using System.Buffers.Binary;
using System.Globalization;
using System.Text;

namespace Pairwright.Imaging;

/// <summary>The head of a PLY file, up to its vertices.</summary>
internal sealed class PlyHeader
{
    private readonly bool isText;
    private readonly bool isBigEndian;

    private PlyHeader(bool isText, bool isBigEndian, int count, IReadOnlyList<(string Name, PlyType Type)> properties, int bodyAt) =>
        (this.isText, this.isBigEndian, Count, Properties, BodyAt) = (isText, isBigEndian, count, properties, bodyAt);

    /// <summary>The number of vertices.</summary>
    public int Count { get; }

    /// <summary>Their properties, in the order of the file.</summary>
    public IReadOnlyList<(string Name, PlyType Type)> Properties { get; }

    /// <summary>Where the first vertex begins.</summary>
    public int BodyAt { get; }

    /// <summary>Reads a head.</summary>
    /// <exception cref="UserErrorException">The content is no PLY whose first element is its vertices.</exception>
    public static PlyHeader Read(ReadOnlySpan<byte> content, string path)
    {
        var end = content.IndexOf("end_header"u8);
        if (!content.StartsWith("ply"u8) || end < 0)
        {
            throw new UserErrorException($"'{path}' is no PLY file; export points as PLY.");
        }

        var bodyAt = end + "end_header".Length;
        bodyAt += content[bodyAt..].StartsWith("\r\n"u8) ? 2 : 1;
        var lines = Encoding.UTF8.GetString(content[..end]).Split('\n', StringSplitOptions.TrimEntries | StringSplitOptions.RemoveEmptyEntries);
        var format = "";
        var count = -1;
        var properties = new List<(string, PlyType)>();
        foreach (var words in lines.Skip(1).Select(line => line.Split(' ', StringSplitOptions.RemoveEmptyEntries)))
        {
            if (words is ["format", var name, ..])
            {
                format = name;
            }
            else if (words is ["element", "vertex", var number] && count < 0 && int.TryParse(number, NumberStyles.None, CultureInfo.InvariantCulture, out var vertices))
            {
                count = vertices;
            }
            else if (words is ["element", ..])
            {
                // Elements after the vertices do not matter; ones before them would have to be skipped.
                if (count < 0)
                {
                    throw new UserErrorException($"'{path}' begins with '{string.Join(' ', words)}' instead of its vertices; export points as PLY.");
                }

                break;
            }
            else if (words is ["property", var type, var property])
            {
                properties.Add((property, TypeOf(type) ?? throw new UserErrorException($"'{path}' has a property '{property}' of the unknown type '{type}'; export points as PLY.")));
            }
            else if (words is ["property", "list", ..])
            {
                throw new UserErrorException($"'{path}' has vertices with lists; export points with x, y and z as PLY.");
            }
        }

        if (format is not ("ascii" or "binary_little_endian" or "binary_big_endian") || count < 0)
        {
            throw new UserErrorException($"'{path}' is a PLY file of the unknown format '{format}' or without vertices; export points as PLY.");
        }

        return new PlyHeader(format == "ascii", format == "binary_big_endian", count, properties, bodyAt).Checked(content, path);
    }

    /// <summary>The place of a property; −1 where the vertices have none of that name.</summary>
    public int Place(string name)
    {
        for (var i = 0; i < Properties.Count; i++)
        {
            if (Properties[i].Name == name)
            {
                return i;
            }
        }

        return -1;
    }

    /// <summary>Reads the next vertex's properties.</summary>
    public void ReadVertex(ReadOnlySpan<byte> content, ref int at, double[] values, string path)
    {
        for (var i = 0; i < values.Length; i++)
        {
            if (isText)
            {
                values[i] = ReadWord(content, ref at, path);
                continue;
            }

            var type = Properties[i].Type;
            values[i] = Number(content.Slice(at, LengthOf(type)), type, isBigEndian);
            at += LengthOf(type);
        }
    }

    private PlyHeader Checked(ReadOnlySpan<byte> content, string path)
    {
        var needed = BodyAt + (isText ? 2L * Properties.Count * Count - 1 : (long)Count * Properties.Sum(property => LengthOf(property.Type)));
        return content.Length >= needed
            ? this
            : throw CutShort(path);
    }

    private static UserErrorException CutShort(string path) => new($"'{path}' is cut short or damaged: it ends before its last vertex; copy or export it again.");

    private static double ReadWord(ReadOnlySpan<byte> content, ref int at, string path)
    {
        while (at < content.Length && content[at] <= ' ')
        {
            at++;
        }

        var start = at;
        while (at < content.Length && content[at] > ' ')
        {
            at++;
        }

        return start == at
            ? throw CutShort(path)
            : double.TryParse(content[start..at], NumberStyles.Float, CultureInfo.InvariantCulture, out var value)
                ? value
                : throw new UserErrorException($"'{path}' holds '{Encoding.UTF8.GetString(content[start..at])}' where a number is wanted; export it again.");
    }

    private static double Number(ReadOnlySpan<byte> bytes, PlyType type, bool big) => type switch
    {
        PlyType.Int8 => (sbyte)bytes[0],
        PlyType.UInt8 => bytes[0],
        PlyType.Int16 => big ? BinaryPrimitives.ReadInt16BigEndian(bytes) : BinaryPrimitives.ReadInt16LittleEndian(bytes),
        PlyType.UInt16 => big ? BinaryPrimitives.ReadUInt16BigEndian(bytes) : BinaryPrimitives.ReadUInt16LittleEndian(bytes),
        PlyType.Int32 => big ? BinaryPrimitives.ReadInt32BigEndian(bytes) : BinaryPrimitives.ReadInt32LittleEndian(bytes),
        PlyType.UInt32 => big ? BinaryPrimitives.ReadUInt32BigEndian(bytes) : BinaryPrimitives.ReadUInt32LittleEndian(bytes),
        PlyType.Float32 => big ? BinaryPrimitives.ReadSingleBigEndian(bytes) : BinaryPrimitives.ReadSingleLittleEndian(bytes),
        _ => big ? BinaryPrimitives.ReadDoubleBigEndian(bytes) : BinaryPrimitives.ReadDoubleLittleEndian(bytes),
    };

    private static int LengthOf(PlyType type) => type switch
    {
        PlyType.Int8 or PlyType.UInt8 => 1,
        PlyType.Int16 or PlyType.UInt16 => 2,
        PlyType.Int32 or PlyType.UInt32 or PlyType.Float32 => 4,
        _ => 8,
    };

    private static PlyType? TypeOf(string name) => name switch
    {
        "char" or "int8" => PlyType.Int8,
        "uchar" or "uint8" => PlyType.UInt8,
        "short" or "int16" => PlyType.Int16,
        "ushort" or "uint16" => PlyType.UInt16,
        "int" or "int32" => PlyType.Int32,
        "uint" or "uint32" => PlyType.UInt32,
        "float" or "float32" => PlyType.Float32,
        "double" or "float64" => PlyType.Float64,
        _ => null,
    };
}
