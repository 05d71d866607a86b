using System.Globalization;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Writes and reads the description of a pair that came rectified: focal length, baseline, offset, centre and size as YAML.</summary>
/// <remarks>
/// Entries: <c>kind: pairwright-rectified-geometry</c>, <c>version: 1</c>, <c>lengths</c> (mm, cm, m or inch), <c>picture</c> (width and
/// height), <c>focal</c> (px), <c>baseline</c> (in the file's unit), <c>offset</c> (px; the right centre's column minus the left one's, zero
/// where left out) and <c>centre</c> (column and row of the left centre, px).
/// </remarks>
public static class RectifiedGeometryFile
{
    private const string Kind = "pairwright-rectified-geometry";
    private const int Version = 1;

    /// <summary>Writes a description.</summary>
    /// <param name="geometry">The geometry; its turn against a left camera's frame is not kept, because such a pair has no raw camera.</param>
    /// <param name="path">The file, replaced only when the new one is whole.</param>
    /// <exception cref="UserErrorException">The file cannot be written.</exception>
    public static void Write(RectifiedGeometry geometry, string path)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        AtomicFile.WriteText(path, YamlHeader.Write(Kind, Version, LengthUnit.Millimetre, "A rectified pair: Z = focal * baseline / (disparity + offset).") + string.Create(
            CultureInfo.InvariantCulture,
            $"""
             picture: [{geometry.Size.Width}, {geometry.Size.Height}]  # px
             focal: {geometry.FocalPixels:R}  # px
             baseline: {geometry.BaselineMm:R}
             offset: {geometry.OffsetPixels:R}  # px
             centre: [{geometry.CentreU:R}, {geometry.CentreV:R}]  # px

             """));
    }

    /// <summary>Reads a description.</summary>
    /// <param name="path">The file.</param>
    /// <exception cref="UserErrorException">The file is missing, of another kind or newer, or an entry is wrong; the sentence names file, line and entry.</exception>
    public static RectifiedGeometry Read(string path)
    {
        var file = YamlEntry.Parse(PictureFile.ReadAll(path), path).WithOnly("kind", "version", "lengths", "picture", "focal", "baseline", "offset", "centre");
        var unit = YamlHeader.Read(file, Kind, Version);
        var size = file.Required("picture").Parts(2);
        var centre = file.Required("centre").Numbers(2);
        return new(
            AboveZero(file.Required("focal")),
            unit * AboveZero(file.Required("baseline")),
            file.Optional("offset")?.Number() ?? 0,
            centre[0],
            centre[1],
            new(size[0].Count(), size[1].Count()));
    }

    private static double AboveZero(YamlEntry entry) =>
        entry.Number() is > 0 and var number ? number : throw entry.Wrong("must be above zero; correct it");
}
