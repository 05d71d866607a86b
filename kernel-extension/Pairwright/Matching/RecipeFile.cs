using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Writes and reads recipes: YAML that a person can read and change.</summary>
/// <remarks>
/// Entries: <c>kind: pairwright-recipe</c>, <c>version: 1</c>; optionally <c>range</c> (least and greatest disparity in pixels, both searched);
/// <c>cost</c>, <c>aggregation</c>, <c>optimisation</c>, <c>sub-pixel</c> and, where it is not the usual one, <c>confidence</c>, each with
/// <c>method</c> and its settings; <c>checks</c> and <c>filters</c>, lists of the same, in the order in which they work.
/// </remarks>
public static class RecipeFile
{
    private const string Kind = "pairwright-recipe";
    private const int Version = 1;

    /// <summary>Writes a recipe.</summary>
    /// <param name="recipe">The recipe. A stage that was written in a cell is written by its name and settings; its code must be given again on reading.</param>
    /// <param name="path">The file, replaced only when the new one is whole.</param>
    /// <param name="withRange">Whether the range goes into the file; without it, the file fits any rig and whoever reads it states the range.</param>
    /// <exception cref="UserErrorException">The file cannot be written.</exception>
    public static void Write(Recipe recipe, string path, bool withRange = true)
    {
        ArgumentNullException.ThrowIfNull(recipe);
        AtomicFile.WriteText(path, Text(recipe, withRange));
    }

    /// <summary>Reads a recipe that <see cref="Write"/> wrote or a person typed.</summary>
    /// <param name="path">The file.</param>
    /// <param name="range">The disparities to search instead of those in the file; needed where the file has none.</param>
    /// <param name="ownStages">Stages that were written in a cell, which the file only names.</param>
    /// <exception cref="UserErrorException">
    /// The file is missing, of another kind or newer, names an unknown stage or a wrong setting, or no range is known; the sentence names file, line and entry.
    /// </exception>
    public static Recipe Read(string path, DisparityRange? range = null, IEnumerable<Stage>? ownStages = null) =>
        Parse(PictureFile.ReadAll(path), path, range, ownStages);

    internal static Recipe Parse(ReadOnlySpan<byte> content, string path, DisparityRange? range = null, IEnumerable<Stage>? ownStages = null)
    {
        var file = YamlEntry.Parse(content, path).WithOnly("kind", "version", "range", "cost", "aggregation", "optimisation", "sub-pixel", "checks", "confidence", "filters");
        YamlHeader.Check(file, Kind, Version);
        var book = new StageBook(ownStages ?? []);
        return Recipe.For(range ?? ReadRange(file)) with
        {
            Cost = (Cost)book.Read(StageKind.Cost, file.Required("cost")),
            Aggregation = (Aggregation)book.Read(StageKind.Aggregation, file.Required("aggregation")),
            Optimisation = (Optimisation)book.Read(StageKind.Optimisation, file.Required("optimisation")),
            SubPixel = (SubPixel)book.Read(StageKind.SubPixel, file.Required("sub-pixel")),
            Checks = file.Required("checks").Parts().Select(entry => (Check)book.Read(StageKind.Check, entry)).ToImmutableArray(),
            Confidence = file.Optional("confidence") is { } confidence ? (Confidence)book.Read(StageKind.Confidence, confidence) : Confidence.PeakRatio,
            Filters = file.Required("filters").Parts().Select(entry => (Filter)book.Read(StageKind.Filter, entry)).ToImmutableArray(),
        };
    }

    internal static string Text(Recipe recipe, bool withRange)
    {
        var text = new StringBuilder("# How to match a rectified pair. Disparities are in pixels; both ends of the range are searched.\n");
        text.Append(CultureInfo.InvariantCulture, $"kind: {Kind}\nversion: {Version}\n");
        if (withRange)
        {
            text.Append(CultureInfo.InvariantCulture, $"range: [{recipe.Range.Least}, {recipe.Range.Most}]\n");
        }

        Append(text, StageKind.Cost, recipe.Cost);
        Append(text, StageKind.Aggregation, recipe.Aggregation);
        Append(text, StageKind.Optimisation, recipe.Optimisation);
        Append(text, StageKind.SubPixel, recipe.SubPixel);
        Append(text, "checks", recipe.Checks);
        Append(text, StageKind.Confidence, recipe.Confidence);
        Append(text, "filters", recipe.Filters);
        return text.ToString();
    }

    private static void Append(StringBuilder text, string name, Stage stage)
    {
        text.Append(CultureInfo.InvariantCulture, $"{name}:\n");
        foreach (var line in Lines(stage))
        {
            text.Append(CultureInfo.InvariantCulture, $"  {line}\n");
        }
    }

    private static void Append<T>(StringBuilder text, string name, ImmutableArray<T> stages)
        where T : Stage
    {
        text.Append(name).Append(stages.IsEmpty ? ": []\n" : ":\n");
        foreach (var stage in stages)
        {
            text.Append(CultureInfo.InvariantCulture, $"  - {string.Join("\n    ", Lines(stage))}\n");
        }
    }

    private static IEnumerable<string> Lines(Stage stage) =>
        stage.Settings.Select(setting => $"{StageBook.Key(setting.Name)}: {Scalar(setting.Value)}").Prepend($"method: {Scalar(stage.Name)}");

    // Plain where YAML takes it as it stands; JSON's quoted text, which is YAML too, elsewhere.
    private static string Scalar(string value) =>
        value.Length > 0 && value.All(letter => char.IsAsciiLetterOrDigit(letter) || letter is '.' or '-' or '+') && char.IsAsciiLetterOrDigit(value[0])
            ? value
            : $"\"{JsonEncodedText.Encode(value, JavaScriptEncoder.UnsafeRelaxedJsonEscaping)}\"";

    private static DisparityRange ReadRange(YamlEntry file)
    {
        var entry = file.Optional("range")
            ?? throw file.Wrong("has no search range, so that it fits any rig; state the disparities to search when reading it");
        var ends = entry.Parts(2);
        try
        {
            return new(ends[0].Whole(), ends[1].Whole());
        }
        catch (UserErrorException fault) when (!fault.Message.StartsWith('\''))
        {
            throw entry.Wrong($"is refused: {fault.Message.TrimEnd('.')}");
        }
    }
}
