namespace Pairwright.Matching;

/// <summary>How costs are summed over a neighbourhood before the optimisation: the second stage of a recipe.</summary>
public abstract class Aggregation : Stage
{
    /// <summary>Each pixel's own cost, as it is.</summary>
    public static Aggregation None { get; } = new NoAggregation();
}
