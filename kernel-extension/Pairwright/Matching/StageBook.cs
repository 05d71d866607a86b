using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>All methods that a recipe file can name, and how each is made from its settings.</summary>
internal sealed class StageBook(IEnumerable<Stage> ownStages)
{
    private static readonly Method[] Methods =
    [
        new(StageKind.Cost, "census", ["width", "height"], entry => Cost.Census(Whole(entry, "width"), Whole(entry, "height"))),
        new(StageKind.Cost, "zncc", ["window"], entry => Cost.Zncc(Whole(entry, "window"))),
        new(
            StageKind.Cost,
            "centre-symmetric census",
            ["width", "height"],
            entry => Cost.CentreSymmetricCensus(Whole(entry, "width"), Whole(entry, "height"))),
        new(StageKind.Cost, "rank", ["window"], entry => Cost.Rank(Whole(entry, "window"))),
        new(StageKind.Cost, "absolute difference", ["limit"], entry => Cost.AbsoluteDifference(OptionalNumber(entry, "limit"))),
        new(StageKind.Cost, "sampling-insensitive difference", ["limit"], entry => Cost.SamplingInsensitiveDifference(OptionalNumber(entry, "limit"))),
        new(StageKind.Cost, "zero-mean sad", ["window"], entry => Cost.ZeroMeanSad(Whole(entry, "window"))),
        new(StageKind.Cost, "ssd", ["window"], entry => Cost.Ssd(Whole(entry, "window"))),
        new(StageKind.Cost, "ncc", ["window"], entry => Cost.Ncc(Whole(entry, "window"))),
        new(StageKind.Cost, "gradient", ["limit"], entry => Cost.Gradient(OptionalNumber(entry, "limit"))),
        new(
            StageKind.Cost,
            "difference and gradient",
            ["gradient-share", "difference-limit", "gradient-limit"],
            entry => Cost.DifferenceAndGradient(Number(entry, "gradient-share"), Number(entry, "difference-limit"), Number(entry, "gradient-limit"))),
        new(
            StageKind.Cost,
            "ad-census",
            ["census-scale", "difference-scale"],
            entry => Cost.AdCensus(Number(entry, "census-scale"), Number(entry, "difference-scale"))),
        new(StageKind.Aggregation, "none", [], _ => Aggregation.None),
        new(StageKind.Optimisation, "winner-take-all", [], _ => Optimisation.WinnerTakesAll),
        new(
            StageKind.Optimisation,
            "semi-global",
            ["paths", "small-penalty", "large-penalty", "flat-levels"],
            entry => Optimisation.SemiGlobal(
                OptionalNumber(entry, "small-penalty"),
                OptionalNumber(entry, "large-penalty"),
                entry.Optional("paths")?.Whole() ?? 8,
                OptionalNumber(entry, "flat-levels"))),
        new(
            StageKind.Optimisation,
            "semi-global with two parents",
            ["small-penalty", "large-penalty", "flat-levels"],
            entry => Optimisation.SemiGlobalWithTwoParents(
                OptionalNumber(entry, "small-penalty"), OptionalNumber(entry, "large-penalty"), OptionalNumber(entry, "flat-levels"))),
        new(StageKind.SubPixel, "none", [], _ => SubPixel.None),
        new(StageKind.SubPixel, "parabola", [], _ => SubPixel.Parabola),
        new(StageKind.SubPixel, "equiangular", [], _ => SubPixel.Equiangular),
        new(StageKind.Check, "left-right", ["tolerance-px"], entry => Check.LeftRight(Whole(entry, "tolerance-px"))),
        new(StageKind.Check, "uniqueness", ["margin"], entry => Check.Uniqueness(Number(entry, "margin"))),
        new(StageKind.Confidence, "peak ratio", [], _ => Confidence.PeakRatio),
        new(StageKind.Confidence, "curvature", [], _ => Confidence.Curvature),
        new(StageKind.Confidence, "left-right", [], _ => Confidence.LeftRight),
        new(StageKind.Filter, "speckle", ["smallest-px", "step-px"], entry => Filter.Speckle(Whole(entry, "smallest-px"), Number(entry, "step-px"))),
        new(StageKind.Filter, "weighted median", ["window", "levels"], entry => Filter.WeightedMedian(Whole(entry, "window"), Number(entry, "levels"))),
        new(StageKind.Filter, "plain texture", ["window", "times-noise"], entry => Filter.PlainTexture(Whole(entry, "window"), Number(entry, "times-noise"))),
        new(StageKind.Filter, "fill", [], _ => Filter.Fill),
        new(StageKind.Filter, "median", [], _ => Filter.Median),
        new(StageKind.Filter, "least squares", ["window"], entry => Filter.LeastSquares(Whole(entry, "window"))),
    ];

    private readonly Stage[] own = [.. ownStages];

    /// <summary>A setting's name as it stands in a file.</summary>
    public static string Key(string settingName) => settingName.Replace(' ', '-');

    /// <summary>The stage that an entry names.</summary>
    /// <exception cref="UserErrorException">There is no such stage, or its settings are refused.</exception>
    public Stage Read(string kind, YamlEntry entry)
    {
        var name = entry.Required("method").Text();
        if (own.FirstOrDefault(stage => StageKind.Of(stage) == kind && stage.Name == name) is { } given)
        {
            // The file may have been written with other settings of the engineer's class: then it means something else.
            var text = string.Join(", ", entry.Named().Where(part => part.Name != "method").Select(part => $"{part.Name} {part.Entry.Text()}"));
            var wanted = string.Join(", ", given.Settings.Select(setting => $"{Key(setting.Name)} {setting.Value}"));
            return text == wanted
                ? given
                : throw entry.Wrong($"names the {kind} '{name}' with the settings '{text}', but the one given on reading has '{wanted}'; give the one that the file means");
        }

        var method = Methods.FirstOrDefault(each => each.Kind == kind && each.Name == name)
            ?? throw entry.Wrong(
                $"names an unknown {kind} '{name}'; known are {string.Join(", ", Methods.Where(each => each.Kind == kind).Select(each => each.Name))}, and those written in a cell when given on reading");
        entry.WithOnly([.. method.Settings, "method"]);
        try
        {
            return method.Make(entry);
        }
        catch (UserErrorException fault) when (!fault.Message.StartsWith('\''))
        {
            throw entry.Wrong($"is refused: {fault.Message.TrimEnd('.')}");
        }
    }

    private static int Whole(YamlEntry entry, string name) => entry.Required(name).Whole();

    private static double Number(YamlEntry entry, string name) => entry.Required(name).Number();

    private static double? OptionalNumber(YamlEntry entry, string name) => entry.Optional(name)?.Number();

    private sealed record Method(string Kind, string Name, string[] Settings, Func<YamlEntry, Stage> Make);
}
