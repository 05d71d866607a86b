using System.Globalization;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Runner.Commands;

namespace Pairwright.Runner.Matching;

/// <summary>What all pairs of one command line share.</summary>
/// <param name="Recipe">How to match, with its range.</param>
/// <param name="Rectification">How to rectify; nothing where the pictures are rectified already.</param>
/// <param name="Geometry">Focal length, baseline and offset of pictures that are rectified already, where they are known.</param>
/// <param name="GeometryFile">The file that either of the two came from.</param>
/// <param name="TruthScale">How many levels of a PNG of true disparities make one pixel, where it was stated.</param>
/// <param name="MemoryMb">The most memory that matching a pair may take, where it was stated; it changes no result.</param>
internal sealed record MatchJob(
    Recipe Recipe, Rectification? Rectification, RectifiedGeometry? Geometry, string? GeometryFile, double? TruthScale, int? MemoryMb)
{
    /// <exception cref="BadUsageException">Options do not go together, or one does not read.</exception>
    /// <exception cref="UserErrorException">A file cannot be read, or its content is refused.</exception>
    public static MatchJob Of(MatchSettings settings)
    {
        if (settings.Rig is not null && settings.Geometry is not null)
        {
            throw new BadUsageException("--rig is for raw pictures and --geometry for rectified ones; give one of them.");
        }
        if (settings.Rig is null && settings.Geometry is null && (settings.Depth ?? settings.Cloud ?? settings.Depths) is not null)
        {
            throw new BadUsageException("--depth, --cloud and --depths take a rig; give --rig FILE for raw pictures, or --geometry FILE for rectified ones.");
        }
        if (settings.Range is not null && settings.Depths is not null)
        {
            throw new BadUsageException("--range and --depths both state what to search; give one of them.");
        }
        if (settings.TruthScale is { } scale && !(scale > 0 && double.IsFinite(scale)))
        {
            throw new BadUsageException($"--truth-scale {scale}: give the number of levels that make one pixel of disparity, above zero.");
        }

        var rectification = settings.Rig is { } rig ? Rectification.Of(RigFile.Read(rig)) : null;
        var geometry = rectification?.Geometry ?? (settings.Geometry is { } file ? RectifiedGeometryFile.Read(file) : null);
        var recipe = RecipeOf(settings, RangeOf(settings, geometry));
        return new MatchJob(
            settings.Fill && !recipe.Filters.Contains(Filter.Fill) ? recipe with { Filters = recipe.Filters.Add(Filter.Fill) } : recipe,
            rectification,
            rectification is null ? geometry : null,
            settings.Rig ?? settings.Geometry,
            settings.TruthScale,
            settings.Memory);
    }

    private static DisparityRange? RangeOf(MatchSettings settings, RectifiedGeometry? geometry)
    {
        if (settings.Range is { } range)
        {
            var ends = range.Split(':');
            return ends.Length == 2 && int.TryParse(ends[0], out var least) && int.TryParse(ends[1], out var most)
                ? new DisparityRange(least, most)
                : throw new BadUsageException($"--range {range}: give the least and the greatest disparity in whole pixels, such as --range 0:127; both are searched.");
        }
        if (settings.Depths is { } depths)
        {
            var ends = depths.Split(':');
            return ends.Length == 2 && TryNumber(ends[0], out var nearest) && TryNumber(ends[1], out var farthest)
                ? Recipe.For(geometry!, nearest, farthest).Range
                : throw new BadUsageException($"--depths {depths}: give the nearest and the farthest depth in millimetres, such as --depths 900:1300.");
        }
        return null;
    }

    private static Recipe RecipeOf(MatchSettings settings, DisparityRange? range)
    {
        if (settings.Recipe is { } file)
        {
            return RecipeFile.Read(file, range);
        }
        return Recipe.For(range ?? throw new BadUsageException(
            "What to search is not stated; give --range MIN:MAX in pixels, or --depths NEAREST:FARTHEST in millimetres with a rig, or a recipe file with a range."));
    }

    private static bool TryNumber(string text, out double number) => double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out number);
}
