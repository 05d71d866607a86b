using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The costs of one row's pixels as bytes, for a cost that the fused matcher covers.</summary>
/// <remarks>One thread works with it.</remarks>
internal abstract unsafe class FusedCostLine<TLanes, TBytes, TWords, TTable> : IDisposable
    where TLanes : struct, ILanes<TBytes, TWords, TTable>
    where TBytes : unmanaged
    where TWords : unmanaged
    where TTable : unmanaged
{
    private readonly RectifiedPair pair;
    private readonly byte standIn;
    private readonly AlignedMemory incomparable;
    private readonly AlignedMemory beyond;
    private readonly bool hasMask;
    private int row;

    protected FusedCostLine(RectifiedPair pair, FusedLayout layout, byte standIn)
    {
        (this.pair, Layout, this.standIn) = (pair, layout, standIn);
        hasMask = pair.Left.Usable is not null || pair.Right.Usable is not null;
        incomparable = AlignedMemory.Filled(layout.LineBytes, byte.MaxValue);
        new Span<byte>(incomparable.Start + layout.Margin, layout.Width).Clear();
        beyond = AlignedMemory.Filled(layout.Lanes, byte.MaxValue);
        new Span<byte>(beyond.Start, layout.Count).Clear();
    }

    protected FusedLayout Layout { get; }

    /// <summary>Ones where a lane of a left column falls on no usable pixel of the right picture.</summary>
    public byte* IncomparableOf(int u) => incomparable.Start + Layout.First(u);

    /// <summary>Ones in the lanes behind the last disparity.</summary>
    public byte* Beyond => beyond.Start;

    /// <summary>Goes to a row.</summary>
    public void Enter(int v)
    {
        row = v;
        if (pair.Right.Usable is { } usable)
        {
            for (var u = 0; u < Layout.Width; u++)
            {
                incomparable.Start[Layout.Margin + Layout.Width - 1 - u] = usable[u, v] ? (byte)0 : byte.MaxValue;
            }
        }

        Prepare(v);
    }

    /// <summary>Whether all disparities of a left column can be compared.</summary>
    public bool IsWhole(int u) => !hasMask && Layout.IsInside(u);

    /// <summary>Whether a left column is usable.</summary>
    public bool IsUsable(int u) => pair.Left.Usable is not { } usable || usable[u, row];

    /// <summary>Fills the costs of one pixel; what cannot be compared has the cost of what has nothing to do with the pixel.</summary>
    public void Fill(int u, byte* costs)
    {
        Compare(u, costs);
        if (!IsWhole(u))
        {
            Close(u, costs);
        }

        if (Layout.Count != Layout.Lanes)
        {
            var last = Layout.Lanes - TLanes.Bytes;
            TLanes.Store(costs + last, TLanes.Or(TLanes.Load(costs + last), TLanes.Load(beyond.Start + last)));
        }
    }

    public virtual void Dispose()
    {
        incomparable.Dispose();
        beyond.Dispose();
    }

    protected abstract void Prepare(int v);

    /// <summary>Fills all lanes of a pixel without asking what can be compared.</summary>
    protected abstract void Compare(int u, byte* costs);

    private void Close(int u, byte* costs)
    {
        var unrelated = TLanes.All(standIn);
        var without = IsUsable(u) ? TLanes.All(0) : TLanes.All(byte.MaxValue);
        var mask = IncomparableOf(u);
        for (nint i = 0; i < Layout.Lanes; i += TLanes.Bytes)
        {
            TLanes.Store(costs + i, TLanes.Select(TLanes.Or(without, TLanes.Load(mask + i)), unrelated, TLanes.Load(costs + i)));
        }
    }
}
