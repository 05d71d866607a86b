namespace Pairwright.Imaging;

/// <summary>The first entries of every file of our own: what it is, the version of its format, and the unit of its lengths.</summary>
internal static class YamlHeader
{
    private static readonly (string Name, LengthUnit Unit, double Millimetres)[] Units =
    [
        ("mm", LengthUnit.Millimetre, 1), ("cm", LengthUnit.Centimetre, 10), ("m", LengthUnit.Metre, 1000), ("inch", LengthUnit.Inch, 25.4),
    ];

    /// <summary>The header's lines.</summary>
    public static string Write(string kind, int version, LengthUnit lengths, string comment) =>
        $"# {comment}\nkind: {kind}\nversion: {version}\nlengths: {NameOf(lengths)}\n";

    /// <summary>Checks the header and returns how many millimetres a unit of length is.</summary>
    /// <exception cref="UserErrorException">The file is of another kind, newer, or of an unknown unit.</exception>
    public static double Read(YamlEntry file, string kind, int version)
    {
        Check(file, kind, version);
        var lengths = file.Required("lengths");
        return Units.FirstOrDefault(unit => unit.Name == lengths.Text()) is { Name: not null } unit
            ? unit.Millimetres
            : throw lengths.Wrong($"is '{lengths.Text()}', but lengths are in {string.Join(", ", Units.Select(unit => unit.Name))}; correct it");
    }

    /// <summary>Checks what the file is and the version of its format.</summary>
    /// <exception cref="UserErrorException">The file is of another kind or newer.</exception>
    public static void Check(YamlEntry file, string kind, int version)
    {
        if (file.Required("kind") is var found && found.Text() != kind)
        {
            throw found.Wrong($"is '{found.Text()}', but a file of kind '{kind}' is wanted; name another file");
        }

        var written = file.Required("version");
        if (written.Count() > version)
        {
            throw written.Wrong($"is {written.Count()}, newer than the {version} that this Pairwright ({Provenance.Version}) knows; update Pairwright");
        }
    }

    /// <summary>How many millimetres a unit of length is.</summary>
    public static double MillimetresPer(LengthUnit unit) => Units.First(known => known.Unit == unit).Millimetres;

    /// <summary>The unit's name in files.</summary>
    public static string NameOf(LengthUnit unit) => Units.First(known => known.Unit == unit).Name;
}
