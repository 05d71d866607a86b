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

    // Stored sums come from memory; at some hundred cycles a pixel this is early enough and does not crowd the nearest cache.
    private const int PixelsAhead = 4;
    private const int CacheLine = 64;

    private readonly FusedLayout layout;
    private readonly FusedCostLine<TLanes, TBytes, TWords, TTable> costs;
    private readonly bool forwards;
    private readonly FusedPenalties penalties;
    private readonly AlignedMemory carried;
    private readonly AlignedMemory along;
    private readonly AlignedMemory pixel;
    private readonly AlignedMemory levels;
    private readonly byte* carriedSlots;
    private readonly byte* carriedLeast;
    private int rowsDone;
    private int shift;

    public FusedSweep(FusedLayout layout, FusedCostLine<TLanes, TBytes, TWords, TTable> costs, bool forwards, FusedPenalties penalties)
    {
        (this.layout, this.costs, this.forwards, this.penalties) = (layout, costs, forwards, penalties);
        carried = AlignedMemory.Filled(layout.CarriedBytes + 2 * Guard, byte.MaxValue);
        carriedSlots = carried.Start + Guard;
        carriedLeast = carriedSlots + (long)Directions * layout.Width * layout.SlotBytes;
        along = AlignedMemory.Filled(layout.SlotBytes + 2 * Guard + 1, byte.MaxValue);
        pixel = AlignedMemory.Filled(layout.Lanes + layout.SumBytes + 2 * Guard, 0);
        levels = AlignedMemory.Filled(2L * sizeof(ushort) * LevelWords, 0);
    }

    /// <summary>How many directions come from the row before.</summary>
    private int Directions => layout.Paths / 2 - 1;

    // Grey levels of the row and of the one before it, each with a zero at either end.
    private int LevelWords => layout.Width + 2;

    private ushort* Levels => (ushort*)levels.Start + 1;

    private ushort* LevelsBefore => Levels + LevelWords;

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
            Step(i, Sum, past: false);
        }

        rowsDone++;
    }

    /// <summary>Goes through the next row and stores its sums.</summary>
    /// <param name="v">The row.</param>
    /// <param name="sums">Where the sums of column 0 go; a multiple of the vector's size.</param>
    public void Store(int v, byte* sums)
    {
        StartRow(v);
        nint bytes = layout.SumBytes;
        for (var i = 0; i < layout.Width; i++)
        {
            var u = Column(i);
            costs.Fill(u, Cost);
            Step(i, sums + u * bytes, past: true);
        }

        rowsDone++;
    }

    /// <summary>Goes through the next row and chooses its winners with the sums of the sweep that came the other way.</summary>
    public void Decide(int v, byte* sums, FusedDecision<TLanes, TBytes, TWords, TTable> decision)
    {
        StartRow(v);
        decision.Begin(forwards);
        nint bytes = layout.SumBytes;
        var ahead = forwards ? PixelsAhead * bytes : -PixelsAhead * bytes;
        for (var i = 0; i < layout.Width; i++)
        {
            var u = Column(i);
            var there = sums + u * bytes;
            for (nint k = 0; k < bytes; k += CacheLine)
            {
                TLanes.Expect(there + ahead + k);
            }

            costs.Fill(u, Cost);
            Step(i, Sum, past: false);
            decision.Choose(u, Cost, Sum, there);
        }

        rowsDone++;
    }

    public void Dispose()
    {
        carried.Dispose();
        along.Dispose();
        pixel.Dispose();
        levels.Dispose();
    }

    private int Column(int i) => forwards ? i : layout.Width - 1 - i;

    private void StartRow(int v)
    {
        costs.Enter(v);
        shift = rowsDone % layout.Width;
        if (penalties.ByDifference != null)
        {
            // The first row has none before it, and no use for its levels.
            penalties.CopyLevels(v, Levels);
            penalties.CopyLevels(Math.Clamp(forwards ? v - 1 : v + 1, 0, layout.Height - 1), LevelsBefore);
        }

        Clear(along.Start + Guard, along.Start + along.Bytes - 1);
        if (Directions == 3)
        {
            // The diagonals that enter at this row's two ends.
            ClearSlot(1, shift == 0 ? 0 : layout.Width - shift);
            ClearSlot(2, shift == 0 ? layout.Width - 1 : shift - 1);
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

    // All paths of one pixel; i counts columns in the sweep's direction.
    private void Step(int i, byte* sum, bool past)
    {
        var straight = carriedSlots + (long)i * layout.SlotBytes;
        var here = along.Start + Guard;
        var hereLeast = along.Start + along.Bytes - 1;
        var hereLarge = penalties.Large;
        var straightLarge = hereLarge;
        var behindLarge = hereLarge;
        var aheadLarge = hereLarge;
        if (penalties.ByDifference is var byDifference && byDifference != null)
        {
            var (u, step) = (Column(i), forwards ? 1 : -1);
            int level = Levels[u];
            hereLarge = byDifference[Math.Abs(level - Levels[u - step])];
            straightLarge = byDifference[Math.Abs(level - LevelsBefore[u])];
            behindLarge = byDifference[Math.Abs(level - LevelsBefore[u - step])];
            aheadLarge = byDifference[Math.Abs(level - LevelsBefore[u + step])];
        }

        if (Directions != 3)
        {
            Pair(here, hereLeast, hereLarge, straight, carriedLeast + i, straightLarge, null, sum, past);
            return;
        }

        // The diagonals first: they do not wait for the column before.
        var behind = i - shift < 0 ? i - shift + layout.Width : i - shift;
        var ahead = i + shift >= layout.Width ? i + shift - layout.Width : i + shift;
        behind += layout.Width;
        ahead += 2 * layout.Width;
        var first = carriedSlots + (long)behind * layout.SlotBytes;
        var second = carriedSlots + (long)ahead * layout.SlotBytes;
        if (layout.Planes == 1)
        {
            Pair(first, carriedLeast + behind, behindLarge, second, carriedLeast + ahead, aheadLarge, null, Sum, false);
            Pair(here, hereLeast, hereLarge, straight, carriedLeast + i, straightLarge, Sum, sum, past);
        }
        else
        {
            Pair(first, carriedLeast + behind, behindLarge, second, carriedLeast + ahead, aheadLarge, null, sum, past);
            Pair(here, hereLeast, hereLarge, straight, carriedLeast + i, straightLarge, null, sum + layout.Lanes, past);
        }
    }

    private void Pair(byte* first, byte* firstLeast, byte firstLarge, byte* second, byte* secondLeast, byte secondLarge, byte* add, byte* sum, bool past)
    {
        switch (add != null, past)
        {
            case (false, false):
                Pair<SumAlone>(first, firstLeast, firstLarge, second, secondLeast, secondLarge, add, sum);
                break;
            case (true, false):
                Pair<SumAdded>(first, firstLeast, firstLarge, second, secondLeast, secondLarge, add, sum);
                break;
            case (false, true):
                Pair<SumAlonePast>(first, firstLeast, firstLarge, second, secondLeast, secondLarge, add, sum);
                break;
            default:
                Pair<SumAddedPast>(first, firstLeast, firstLarge, second, secondLeast, secondLarge, add, sum);
                break;
        }
    }

    // Two paths at a time: more would not fit into the registers.
    [MethodImpl(MethodImplOptions.NoInlining | MethodImplOptions.AggressiveOptimization)]
    private void Pair<TSum>(byte* first, byte* firstLeast, byte firstLarge, byte* second, byte* secondLeast, byte secondLarge, byte* add, byte* sum)
        where TSum : struct, ISum
    {
        nint lanes = layout.Lanes;
        nint bytes = TLanes.Bytes;
        var cost = Cost;
        var (small, largeFirst, largeSecond) = (TLanes.All(penalties.Small), TLanes.All(firstLarge), TLanes.All(secondLarge));
        var (subtractFirst, subtractSecond) = (TLanes.All(*firstLeast), TLanes.All(*secondLeast));
        var (leastFirst, leastSecond) = (TLanes.All(byte.MaxValue), TLanes.All(byte.MaxValue));
        var (belowFirst, belowSecond) = (TLanes.Load(first - 1), TLanes.Load(second - 1));
        nint k = 0;
        for (; k <= lanes - 2 * bytes; k += 2 * bytes)
        {
            // The next vector's lower neighbours must be read before this vector is replaced. Two vectors a turn, so that they need not be moved.
            var own = TLanes.Load(cost + k);
            var nextFirst = TLanes.Load(first + k + bytes - 1);
            var addFirst = Follow(first + k, belowFirst, own, small, largeFirst, subtractFirst, ref leastFirst);
            var nextSecond = TLanes.Load(second + k + bytes - 1);
            var addSecond = Follow(second + k, belowSecond, own, small, largeSecond, subtractSecond, ref leastSecond);
            Put<TSum>(TLanes.Add(addFirst, addSecond), add + k, sum + k);

            own = TLanes.Load(cost + k + bytes);
            belowFirst = TLanes.Load(first + k + 2 * bytes - 1);
            addFirst = Follow(first + k + bytes, nextFirst, own, small, largeFirst, subtractFirst, ref leastFirst);
            belowSecond = TLanes.Load(second + k + 2 * bytes - 1);
            addSecond = Follow(second + k + bytes, nextSecond, own, small, largeSecond, subtractSecond, ref leastSecond);
            Put<TSum>(TLanes.Add(addFirst, addSecond), add + k + bytes, sum + k + bytes);
        }

        if (k < lanes)
        {
            var own = TLanes.Load(cost + k);
            var addFirst = Follow(first + k, belowFirst, own, small, largeFirst, subtractFirst, ref leastFirst);
            var addSecond = Follow(second + k, belowSecond, own, small, largeSecond, subtractSecond, ref leastSecond);
            Put<TSum>(TLanes.Add(addFirst, addSecond), add + k, sum + k);
        }

        *firstLeast = TLanes.Least(leastFirst);
        *secondLeast = TLanes.Least(leastSecond);
    }

    // One vector of one path (Hirschmüller 2008, equation 13): replaces its costs and gives what it adds to the pixel's own.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static TBytes Follow(byte* path, TBytes below, TBytes own, TBytes small, TBytes large, TBytes subtract, ref TBytes least)
    {
        var add = TLanes.AddUpTo255(TLanes.Min(below, TLanes.Load(path + 1)), small);
        add = TLanes.Min(TLanes.Subtract(TLanes.Min(add, TLanes.Load(path)), subtract), large);
        var cost = TLanes.AddUpTo255(add, own);
        TLanes.Store(path, cost);
        least = TLanes.Min(least, cost);
        return add;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Put<TSum>(TBytes value, byte* add, byte* sum)
        where TSum : struct, ISum
    {
        if (TSum.IsAdded)
        {
            value = TLanes.Add(value, TLanes.Load(add));
        }

        if (TSum.GoesPast)
        {
            TLanes.StorePast(sum, value);
        }
        else
        {
            TLanes.Store(sum, value);
        }
    }

    // Known when the loop is compiled, so that it asks nothing.
    private interface ISum
    {
        static abstract bool IsAdded { get; }

        static abstract bool GoesPast { get; }
    }

    private readonly struct SumAlone : ISum
    {
        public static bool IsAdded => false;

        public static bool GoesPast => false;
    }

    private readonly struct SumAdded : ISum
    {
        public static bool IsAdded => true;

        public static bool GoesPast => false;
    }

    private readonly struct SumAlonePast : ISum
    {
        public static bool IsAdded => false;

        public static bool GoesPast => true;
    }

    private readonly struct SumAddedPast : ISum
    {
        public static bool IsAdded => true;

        public static bool GoesPast => true;
    }
}
