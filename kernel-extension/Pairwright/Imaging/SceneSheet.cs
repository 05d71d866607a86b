using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>What is known of a scene beforehand: named regions of the left picture and their stated lengths.</summary>
/// <remarks>
/// A YAML file: <c>kind: pairwright-scene</c>, <c>version: 1</c>, <c>lengths</c> (mm, cm, m or inch), and <c>regions</c>, each with
/// <c>name</c>, <c>outline</c> (points [u, v] in raw pixels of the left picture) and, where any are known, <c>values</c> (names and lengths).
/// </remarks>
/// <param name="Regions">The regions, in the order of the file.</param>
public sealed record SceneSheet(ImmutableArray<SceneRegion> Regions)
{
    private const string Kind = "pairwright-scene";
    private const int Version = 1;

    /// <summary>The region of a name.</summary>
    /// <exception cref="UserErrorException">There is none.</exception>
    public SceneRegion this[string name] =>
        Regions.FirstOrDefault(region => region.Name == name)
        ?? throw new UserErrorException($"The scene sheet has no region '{name}'; it has {string.Join(", ", Regions.Select(region => region.Name))}.");

    /// <summary>Writes the sheet, in millimetres.</summary>
    /// <param name="path">The file, replaced only when the new one is whole.</param>
    /// <exception cref="UserErrorException">The file cannot be written.</exception>
    public void Write(string path)
    {
        var text = new StringBuilder(YamlHeader.Write(Kind, Version, LengthUnit.Millimetre, "Regions of the left picture (outlines in raw pixels) and what is known of them."));
        text.Append("regions:\n");
        foreach (var region in Regions)
        {
            text.Append(CultureInfo.InvariantCulture, $"  - name: {region.Name}\n    outline:\n");
            foreach (var pixel in region.Outline)
            {
                text.Append(CultureInfo.InvariantCulture, $"      - [{pixel.U:0.###}, {pixel.V:0.###}]\n");
            }

            if (!region.ValuesMm.IsEmpty)
            {
                text.Append("    values:\n");
            }

            foreach (var (name, value) in region.ValuesMm)
            {
                text.Append(CultureInfo.InvariantCulture, $"      {name}: {value:0.####}\n");
            }
        }

        AtomicFile.WriteText(path, text.ToString());
    }

    /// <summary>Reads a sheet.</summary>
    /// <param name="path">The file.</param>
    /// <exception cref="UserErrorException">The file is missing, of another kind or newer, or an entry is wrong; the sentence names file, line and entry.</exception>
    public static SceneSheet Read(string path)
    {
        var file = YamlEntry.Parse(PictureFile.ReadAll(path), path).WithOnly("kind", "version", "lengths", "regions");
        var unit = YamlHeader.Read(file, Kind, Version);
        return new([.. file.Required("regions").Parts().Select(entry => ReadRegion(entry, unit))]);
    }

    private static SceneRegion ReadRegion(YamlEntry entry, double unit)
    {
        entry.WithOnly("name", "outline", "values");
        var outline = entry.Required("outline");
        var points = outline.Parts().Select(part => part.Numbers(2)).Select(pair => new RawPixel(pair[0], pair[1])).ToImmutableArray();
        if (points.Length < 3)
        {
            throw outline.Wrong($"has {points.Length} points, but an area has at least three; add the missing ones");
        }

        var values = entry.Optional("values")?.Named().ToImmutableSortedDictionary(value => value.Name, value => value.Entry.Number() * unit);
        return new(entry.Required("name").Text(), points, values ?? ImmutableSortedDictionary<string, double>.Empty);
    }
}
