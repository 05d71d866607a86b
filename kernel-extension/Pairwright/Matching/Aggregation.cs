using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>How costs are summed over a neighbourhood before the optimisation: the second stage of a recipe.</summary>
/// <remarks>Derive from it in a cell to try one of your own. Weights add up to one, so that costs keep their scale and penalties their meaning.</remarks>
public abstract class Aggregation : Stage
{
    /// <summary>Each pixel's own cost, as it is.</summary>
    public static Aggregation None { get; } = new NoAggregation();

    /// <summary>
    /// How many rows above and below a row its aggregated costs depend on at most, in pixels; nothing where there is no bound, so that the whole
    /// volume must be held at once.
    /// </summary>
    public virtual int? ReachPx => null;

    /// <summary>Looks at a pair once, so that its costs can be aggregated.</summary>
    /// <param name="pair">The pair.</param>
    public abstract IAggregator Prepare(RectifiedPair pair);
}
