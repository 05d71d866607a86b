using System.Runtime.CompilerServices;

namespace Pairwright.Matching;

/// <summary>One sweep over the rows of a pair: half of the paths of semi-global matching, those that lead in the sweep's direction.</summary>
/// <remarks>
/// <para>
/// The sweep goes through rows downwards and columns rightwards, or through both the other way. Its paths come from the column before, and from the
/// row before straight on, from one column behind, and from one column ahead. Path costs are bytes: with the minimum of the pixel before
/// subtracted they never exceed the pixel's own cost and the large penalty. They are replaced in place: those straight on have a slot for
/// each column, those on diagonals a slot for each diagonal, counted round the width, so that a slot meets its next pixel in the next row.
/// </para>
/// <para>
/// What a path adds to the pixel's own cost is what the sums hold; the own cost is added once for all paths when a winner is chosen. A path that
/// begins at a pixel adds nothing, which a slot of zeros gives.
/// </para>
/// </remarks>
internal sealed unsafe class FusedSweep<TLanes, TBytes, TWords, TTable> : IDisposable
    where TLanes : struct, ILanes<TBytes, TWords, TTable>
    where TBytes : unmanaged
    where TWords : unmanaged
    where TTable : unmanaged
{
    // Path costs before the first slot and behind the last one are read with their neighbours, and mean nothing.
    private const int Guard = 64;

    private readonly FusedLayout layout;
    private readonly FusedCostLine<TLanes, TBytes, TWords, TTable> costs;
    private readonly bool forwards;
    private readonly byte small;
    private readonly byte large;
    private readonly AlignedMemory carried;
    private readonly AlignedMemory along;
    private readonly AlignedMemory pixel;
    private readonly byte* carriedSlots;
    private readonly byte* carriedLeast;
    private int rowsDone;

    public FusedSweep(FusedLayout layout, FusedCostLine<TLanes, TBytes, TWords, TTable> costs, bool forwards, int small, int large)
    {
        (this.layout, this.costs, this.forwards, this.small, this.large) = (layout, costs, forwards, (byte)small, (byte)large);
        carried = AlignedMemory.Filled(layout.CarriedBytes + 2 * Guard, byte.MaxValue);
        carriedSlots = carried.Start + Guard;
        carriedLeast = carriedSlots + (long)Directions * layout.Width * layout.SlotBytes;
        along = AlignedMemory.Filled(layout.SlotBytes + 2 * Guard + 1, byte.MaxValue);
        pixel = AlignedMemory.Filled(layout.Lanes + layout.SumBytes + 2 * Guard, 0);
    }

    /// <summary>How many directions come from the row before.</summary>
    private int Directions => layout.Paths / 2 - 1;

    private byte* Cost => pixel.Start;

    private byte* Sum => pixel.Start + layout.Lanes;

    /// <summary>The bytes of a state that <see cref="Save"/> writes.</summary>
    public static long StateBytes(FusedLayout layout) => layout.CarriedBytes + 2 * Guard;

    /// <summary>Begins anew: the next row is the first one.</summary>
    public void Begin()
    {
        rowsDone = 0;
        for (var i = 0; i < Directions * layout.Width; i++)
        {
            Clear(carriedSlots + (long)i * layout.SlotBytes, carriedLeast + i);
        }
    }

    /// <summary>Keeps what the next row needs to know of those before.</summary>
    public void Save(byte* to, out int rows)
    {
        Buffer.MemoryCopy(carried.Start, to, carried.Bytes, carried.Bytes);
        rows = rowsDone;
    }

    /// <summary>Goes on from what was kept.</summary>
    public void Restore(byte* from, int rows)
    {
        Buffer.MemoryCopy(from, carried.Start, carried.Bytes, carried.Bytes);
        rowsDone = rows;
    }

    /// <summary>Goes through the next row and keeps nothing but what the row after it needs.</summary>
    public void Pass(int v)
    {
        StartRow(v);
        for (var i = 0; i < layout.Width; i++)
        {
            costs.Fill(Column(i), Cost);
            Step(i, Sum);
        }

        rowsDone++;
    }

    /// <summary>Goes through the next row and stores its sums.</summary>
    /// <param name="v">The row.</param>
    /// <param name="sums">Where the sums of column 0 go.</param>
    public void Store(int v, byte* sums)
    {
        StartRow(v);
        nint bytes = layout.SumBytes;
        for (var i = 0; i < layout.Width; i++)
        {
            var u = Column(i);
            costs.Fill(u, Cost);
            Step(i, Sum);
            var to = sums + u * bytes;
            for (nint k = 0; k < bytes; k += TLanes.Bytes)
            {
                TLanes.StorePast(to + k, TLanes.Load(Sum + k));
            }
        }

        rowsDone++;
    }

    /// <summary>Goes through the next row and chooses its winners with the sums of the sweep that came the other way.</summary>
    public void Decide(int v, byte* sums, FusedDecision<TLanes, TBytes, TWords, TTable> decision)
    {
        StartRow(v);
        decision.Begin(forwards);
        nint bytes = layout.SumBytes;
        for (var i = 0; i < layout.Width; i++)
        {
            var u = Column(i);
            costs.Fill(u, Cost);
            Step(i, Sum);
            decision.Choose(u, Cost, Sum, sums + u * bytes);
        }

        rowsDone++;
    }

    public void Dispose()
    {
        carried.Dispose();
        along.Dispose();
        pixel.Dispose();
    }

    private int Column(int i) => forwards ? i : layout.Width - 1 - i;

    private void StartRow(int v)
    {
        costs.Enter(v);
        Clear(along.Start + Guard, along.Start + along.Bytes - 1);
        if (Directions == 3)
        {
            // The diagonals that enter at this row's two ends.
            ClearSlot(1, Slot(0, -rowsDone));
            ClearSlot(2, Slot(layout.Width - 1, rowsDone));
        }
    }

    private void ClearSlot(int direction, int slot)
    {
        var index = direction * layout.Width + slot;
        Clear(carriedSlots + (long)index * layout.SlotBytes, carriedLeast + index);
    }

    private void Clear(byte* slot, byte* least)
    {
        new Span<byte>(slot, layout.Count).Clear();
        *least = 0;
    }

    private int Slot(int i, int shift)
    {
        var slot = (i + shift) % layout.Width;
        return slot < 0 ? slot + layout.Width : slot;
    }

    // All paths of one pixel; i counts columns in the sweep's direction.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void Step(int i, byte* sum)
    {
        var straight = carriedSlots + (long)i * layout.SlotBytes;
        if (Directions == 3)
        {
            // The paths from the row before first: they do not wait for the column before.
            var behind = layout.Width + Slot(i, -rowsDone % layout.Width);
            var ahead = 2 * layout.Width + Slot(i, rowsDone % layout.Width);
            Pair(
                carriedSlots + (long)behind * layout.SlotBytes, carriedLeast + behind,
                carriedSlots + (long)ahead * layout.SlotBytes, carriedLeast + ahead, sum, false);
            Pair(along.Start + Guard, along.Start + along.Bytes - 1, straight, carriedLeast + i, layout.Planes == 1 ? sum : sum + layout.Lanes, layout.Planes == 1);
        }
        else
        {
            Pair(along.Start + Guard, along.Start + along.Bytes - 1, straight, carriedLeast + i, sum, false);
        }
    }

    // Two paths at a time: more would not fit into the registers.
    [MethodImpl(MethodImplOptions.NoInlining | MethodImplOptions.AggressiveOptimization)]
    private void Pair(byte* first, byte* firstLeast, byte* second, byte* secondLeast, byte* sum, bool add)
    {
        nint lanes = layout.Lanes;
        var cost = Cost;
        var (smallPenalty, largePenalty) = (TLanes.All(small), TLanes.All(large));
        var (subtractFirst, subtractSecond) = (TLanes.All(*firstLeast), TLanes.All(*secondLeast));
        var (leastFirst, leastSecond) = (TLanes.All(byte.MaxValue), TLanes.All(byte.MaxValue));
        var (belowFirst, belowSecond) = (TLanes.Load(first - 1), TLanes.Load(second - 1));
        for (nint k = 0; k < lanes; k += TLanes.Bytes)
        {
            var own = TLanes.Load(cost + k);

            // The next vector's lower neighbours must be read before this vector is replaced.
            var nextFirst = TLanes.Load(first + k + TLanes.Bytes - 1);
            var addFirst = TLanes.Min(belowFirst, TLanes.Load(first + k + 1));
            addFirst = TLanes.Min(TLanes.AddUpTo255(addFirst, smallPenalty), TLanes.Load(first + k));
            addFirst = TLanes.Min(TLanes.Subtract(addFirst, subtractFirst), largePenalty);
            var pathFirst = TLanes.AddUpTo255(addFirst, own);
            TLanes.Store(first + k, pathFirst);
            leastFirst = TLanes.Min(leastFirst, pathFirst);
            belowFirst = nextFirst;

            var nextSecond = TLanes.Load(second + k + TLanes.Bytes - 1);
            var addSecond = TLanes.Min(belowSecond, TLanes.Load(second + k + 1));
            addSecond = TLanes.Min(TLanes.AddUpTo255(addSecond, smallPenalty), TLanes.Load(second + k));
            addSecond = TLanes.Min(TLanes.Subtract(addSecond, subtractSecond), largePenalty);
            var pathSecond = TLanes.AddUpTo255(addSecond, own);
            TLanes.Store(second + k, pathSecond);
            leastSecond = TLanes.Min(leastSecond, pathSecond);
            belowSecond = nextSecond;

            var both = TLanes.Add(addFirst, addSecond);
            TLanes.Store(sum + k, add ? TLanes.Add(TLanes.Load(sum + k), both) : both);
        }

        *firstLeast = TLanes.Least(leastFirst);
        *secondLeast = TLanes.Least(leastSecond);
    }
}
