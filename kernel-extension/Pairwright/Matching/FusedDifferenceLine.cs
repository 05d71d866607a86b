using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Limited absolute differences of 8-bit levels as bytes.</summary>
internal sealed unsafe class FusedDifferenceLine<TLanes, TBytes, TWords, TTable> : FusedCostLine<TLanes, TBytes, TWords, TTable>
    where TLanes : struct, ILanes<TBytes, TWords, TTable>
    where TBytes : unmanaged
    where TWords : unmanaged
    where TTable : unmanaged
{
    private readonly RectifiedPair pair;
    private readonly byte limit;
    private readonly AlignedMemory left;
    private readonly AlignedMemory right;

    public FusedDifferenceLine(RectifiedPair pair, FusedLayout layout, byte standIn, byte limit)
        : base(pair, layout, standIn)
    {
        (this.pair, this.limit) = (pair, limit);
        left = new(layout.Width);
        right = AlignedMemory.Filled(layout.LineBytes, 0);
    }

    public override void Dispose()
    {
        base.Dispose();
        left.Dispose();
        right.Dispose();
    }

    protected override void Prepare(int v)
    {
        var width = Layout.Width;
        var here = pair.Left.Grey.Slice(v * width, width);
        var there = pair.Right.Grey.Slice(v * width, width);
        for (var u = 0; u < width; u++)
        {
            left.Start[u] = (byte)here[u];
            right.Start[Layout.Margin + width - 1 - u] = (byte)there[u];
        }
    }

    protected override void Compare(int u, byte* costs)
    {
        var (level, most) = (TLanes.All(left.Start[u]), TLanes.All(limit));
        var there = right.Start + Layout.First(u);
        for (nint i = 0; i < Layout.Lanes; i += TLanes.Bytes)
        {
            TLanes.Store(costs + i, TLanes.Min(TLanes.AbsoluteDifference(level, TLanes.Load(there + i)), most));
        }
    }
}
