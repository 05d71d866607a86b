using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>A recipe's cost and penalties in whole numbers, as the fused matcher takes them.</summary>
internal sealed record FusedCost
{
    // Two paths' additions must fit into a byte.
    private const int LargestPenalty = byte.MaxValue / 2;

    private readonly RectifiedPair pair;
    private readonly Cost cost;
    private readonly SemiGlobal optimisation;
    private readonly byte standIn;
    private readonly PathPenalties penalties;

    private FusedCost(RectifiedPair pair, Cost cost, SemiGlobal optimisation, int largest, double unrelated)
    {
        (this.pair, this.cost, this.optimisation, standIn) = (pair, cost, optimisation, (byte)unrelated);
        penalties = new(optimisation, unrelated, pair.Left);
        LargestTotal = Paths * (Math.Max(largest, standIn) + LargePenalty);
    }

    /// <summary>How many paths lead to a pixel.</summary>
    public int Paths => optimisation.Paths;

    /// <summary>The large penalty where it is not lowered.</summary>
    public int LargePenalty => (int)penalties.LargeAt(0);

    /// <summary>What no total exceeds.</summary>
    public int LargestTotal { get; }

    /// <summary>The cost of a recipe; nothing where it is not one that is fused.</summary>
    public static FusedCost? Of(RectifiedPair pair, Recipe recipe)
    {
        if (recipe.Aggregation is not NoAggregation || recipe.Optimisation is not SemiGlobal { Paths: 4 or 8, TwoParents: false } semiGlobal)
        {
            return null;
        }

        // Costs must be whole numbers, so that sums are the same in any order.
        int? largest = recipe.Cost switch
        {
            CensusCost census => census.Bits,
            CentreSymmetricCensusCost census => census.Bits,
            AbsoluteDifferenceCost { Limit: { } limit } when pair.Left.SignificantBits == 8 && limit == Math.Floor(limit) && limit <= byte.MaxValue => (int)limit,
            _ => null,
        };
        if (largest is null)
        {
            return null;
        }

        var unrelated = double.IsNaN(recipe.Cost.Unrelated) ? CostScale.Of(recipe.Cost, recipe.Cost.Prepare(pair), pair, recipe.Range) : recipe.Cost.Unrelated;
        var (small, large) = (semiGlobal.SmallPenalty(unrelated), semiGlobal.LargePenalty(unrelated));
        var isWhole = small == Math.Floor(small) && large == Math.Floor(large) && unrelated == Math.Floor(unrelated);
        return isWhole && large <= LargestPenalty && Math.Max(largest.Value, unrelated) + large <= byte.MaxValue
            ? new(pair, recipe.Cost, semiGlobal, largest.Value, unrelated)
            : null;
    }

    /// <summary>The penalties.</summary>
    public FusedPenalties Penalties() => new(penalties, pair.Left, optimisation.FlatLevels is not null);

    /// <summary>The costs of rows.</summary>
    public FusedCostLine<TLanes, TBytes, TWords, TTable> Lines<TLanes, TBytes, TWords, TTable>(FusedLayout layout)
        where TLanes : struct, ILanes<TBytes, TWords, TTable>
        where TBytes : unmanaged
        where TWords : unmanaged
        where TTable : unmanaged => cost switch
        {
            AbsoluteDifferenceCost difference => new FusedDifferenceLine<TLanes, TBytes, TWords, TTable>(pair, layout, standIn, (byte)difference.Limit!),
            _ => new FusedCensusLine<TLanes, TBytes, TWords, TTable>(pair, layout, standIn, ((WindowCost)cost).Window, cost is CentreSymmetricCensusCost),
        };
}
