using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>A recipe's cost and penalties in whole numbers, as the fused matcher takes them.</summary>
/// <param name="Window">The census window.</param>
/// <param name="Largest">The largest cost.</param>
/// <param name="StandIn">The cost of what cannot be compared.</param>
/// <param name="Small">The penalty of a change by one.</param>
/// <param name="Large">The penalty of a larger change.</param>
internal sealed record FusedCost(PictureSize Window, int Largest, byte StandIn, int Small, int Large)
{
    // Two paths' additions must fit into a byte.
    private const int LargestPenalty = byte.MaxValue / 2;

    /// <summary>How many paths lead to a pixel.</summary>
    public int Paths => 8;

    /// <summary>What no total exceeds.</summary>
    public int LargestTotal => Paths * (Largest + Large);

    /// <summary>The cost of a recipe; nothing where it is not one that is fused.</summary>
    public static FusedCost? Of(Recipe recipe)
    {
        if (recipe.Cost is not CensusCost census || recipe.Aggregation is not NoAggregation
            || recipe.Optimisation is not SemiGlobal { Paths: 8, FlatLevels: null, TwoParents: false } semiGlobal)
        {
            return null;
        }

        var (small, large) = (semiGlobal.SmallPenalty(census.Unrelated), semiGlobal.LargePenalty(census.Unrelated));
        var fits = small == Math.Floor(small) && large == Math.Floor(large) && large <= LargestPenalty && census.Bits + large <= byte.MaxValue;
        return fits ? new(census.Window, census.Bits, (byte)census.Unrelated, (int)small, (int)large) : null;
    }

    /// <summary>The costs of rows of a pair.</summary>
    public FusedCostLine<TLanes, TBytes, TWords, TTable> Lines<TLanes, TBytes, TWords, TTable>(RectifiedPair pair, FusedLayout layout)
        where TLanes : struct, ILanes<TBytes, TWords, TTable>
        where TBytes : unmanaged
        where TWords : unmanaged
        where TTable : unmanaged =>
        new FusedCensusLine<TLanes, TBytes, TWords, TTable>(pair, layout, Window, StandIn);
}
