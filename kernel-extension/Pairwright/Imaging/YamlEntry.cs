using System.Globalization;
using System.Text;
using YamlDotNet.Core;
using YamlDotNet.RepresentationModel;

namespace Pairwright.Imaging;

/// <summary>One entry of a YAML file that knows its place, so that what is wrong with it can be said by file, line and name.</summary>
internal sealed class YamlEntry
{
    private readonly string file;
    private readonly string place;
    private readonly YamlNode node;

    private YamlEntry(string file, string place, YamlNode node) => (this.file, this.place, this.node) = (file, place, node);

    /// <summary>The topmost entry of a file.</summary>
    /// <exception cref="UserErrorException">The content is no YAML.</exception>
    public static YamlEntry Parse(ReadOnlySpan<byte> content, string file)
    {
        try
        {
            var stream = new YamlStream();
            stream.Load(new StringReader(Encoding.UTF8.GetString(content)));
            return stream.Documents.Count == 1
                ? new(file, "", stream.Documents[0].RootNode)
                : throw new UserErrorException($"'{file}' holds {stream.Documents.Count} YAML documents instead of one; correct the file.");
        }
        catch (YamlException fault)
        {
            throw new UserErrorException($"'{file}' is not valid YAML at line {fault.Start.Line}, column {fault.Start.Column}; correct the file.", fault);
        }
        catch (InvalidOperationException fault)
        {
            // The parser's own word for a bracket that is never closed; it tells no place.
            throw new UserErrorException($"'{file}' is not valid YAML (a bracket may be open); correct the file.", fault);
        }
    }

    /// <summary>Demands a mapping with no other names than these: a misspelt name must not pass for one left out.</summary>
    public YamlEntry WithOnly(params string[] names)
    {
        foreach (var key in Mapping().Children.Keys)
        {
            if (key is not YamlScalarNode { Value: { } name } || !names.Contains(name))
            {
                throw Wrong($"has an unknown entry '{key}'; allowed are {string.Join(", ", names)}", key);
            }
        }

        return this;
    }

    /// <summary>The entry of a name.</summary>
    /// <exception cref="UserErrorException">There is none.</exception>
    public YamlEntry Required(string name) => Optional(name) ?? throw Wrong($"lacks the entry '{name}'; add it");

    /// <summary>The entry of a name, or nothing.</summary>
    public YamlEntry? Optional(string name) =>
        Mapping().Children.TryGetValue(new YamlScalarNode(name), out var child) ? new(file, place.Length == 0 ? name : $"{place}.{name}", child) : null;

    /// <summary>The named entries of a mapping whose names are free.</summary>
    public IEnumerable<(string Name, YamlEntry Entry)> Named() =>
        Mapping().Children.Keys.Select(key => (key as YamlScalarNode)?.Value ?? throw Wrong("has a name that is not a word; correct it", key))
            .Select(name => (name, Required(name)));

    /// <summary>The entry as text.</summary>
    public string Text() => node is YamlScalarNode { Value: { } text } ? text : throw Wrong("must be a word; correct it");

    /// <summary>The entry as a finite number.</summary>
    public double Number() =>
        node is YamlScalarNode { Value: { } text } && double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out var number) && double.IsFinite(number)
            ? number
            : throw Wrong($"holds '{node}', which is not a finite number; correct it");

    /// <summary>The entry as a whole number above zero.</summary>
    public int Count() =>
        node is YamlScalarNode { Value: { } text } && int.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out var count) && count > 0
            ? count
            : throw Wrong($"holds '{node}', which is not a whole number above zero; correct it");

    /// <summary>The entry as a whole number of either sign.</summary>
    public int Whole() =>
        node is YamlScalarNode { Value: { } text } && int.TryParse(text, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out var whole)
            ? whole
            : throw Wrong($"holds '{node}', which is not a whole number; correct it");

    /// <summary>The entry's parts.</summary>
    public IReadOnlyList<YamlEntry> Parts() =>
        node is YamlSequenceNode sequence
            ? [.. sequence.Children.Select((child, index) => new YamlEntry(file, $"{place}[{index + 1}]", child))]
            : throw Wrong("must be a list in brackets; correct it");

    /// <summary>The entry's parts, of a stated number.</summary>
    public IReadOnlyList<YamlEntry> Parts(int count)
    {
        var parts = Parts();
        return parts.Count == count ? parts : throw Wrong($"has {parts.Count} parts instead of {count}; correct it");
    }

    /// <summary>The entry as a list of finite numbers of a stated length.</summary>
    public double[] Numbers(int count) => [.. Parts(count).Select(part => part.Number())];

    /// <summary>The error of this entry: the file, the line, the name, and what is wrong.</summary>
    public UserErrorException Wrong(string reason, YamlNode? at = null) =>
        new($"'{file}', line {(at ?? node).Start.Line}: {(place.Length == 0 ? "the file" : $"the entry '{place}'")} {reason}.");

    private YamlMappingNode Mapping() => node as YamlMappingNode ?? throw Wrong("must hold named entries; correct it");
}
