namespace Pairwright.Matching;

/// <summary>The places of a recipe, by the names that they have in sentences and in files.</summary>
internal static class StageKind
{
    public const string Cost = "cost";
    public const string Aggregation = "aggregation";
    public const string Optimisation = "optimisation";
    public const string SubPixel = "sub-pixel";
    public const string Check = "check";
    public const string Confidence = "confidence";
    public const string Filter = "filter";

    /// <summary>The place that a stage can stand at.</summary>
    public static string Of(Stage stage) => stage switch
    {
        Matching.Cost => Cost,
        Matching.Aggregation => Aggregation,
        Matching.Optimisation => Optimisation,
        Matching.SubPixel => SubPixel,
        Matching.Check => Check,
        Matching.Confidence => Confidence,
        Matching.Filter => Filter,
        _ => "stage",
    };
}
