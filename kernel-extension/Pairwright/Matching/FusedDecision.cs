using System.Numerics;
using System.Runtime.CompilerServices;

namespace Pairwright.Matching;

/// <summary>Chooses the winners of a row from both sweeps' sums, seen from the left and from the right picture.</summary>
/// <remarks>
/// <para>
/// A total is the pixel's own cost once for each path and what the paths add; it has 16 bits at most, mostly fewer. Below it, as far as there is
/// room, stands the number of the vector that it belongs to, so that the least of a lane tells where it came from, and of equal totals the
/// least disparity is found without a second look. 65,535 marks what cannot be compared.
/// </para>
/// <para>
/// A winner's neighbours do not count as rivals. A lane in which the least entry is the winner or a neighbour has its second least
/// entry as the rival; every other lane has its least one.
/// </para>
/// </remarks>
internal sealed unsafe class FusedDecision<TLanes, TBytes, TWords, TTable> : IDisposable
    where TLanes : struct, ILanes<TBytes, TWords, TTable>
    where TBytes : unmanaged
    where TWords : unmanaged
    where TTable : unmanaged
{
    private const ushort None = ushort.MaxValue;

    private readonly FusedLayout layout;
    private readonly FusedCostLine<TLanes, TBytes, TWords, TTable> costs;
    private readonly RowMatches row;
    private readonly AlignedMemory entries;
    private readonly AlignedMemory around;
    private readonly AlignedMemory rightLowest;
    private readonly AlignedMemory rightColumn;
    private readonly FoundColumns found;
    private readonly AlignedMemory marks;
    private readonly int words;
    private readonly int pathShift;
    private readonly int numberBits;
    private readonly bool isNumbered;
    private bool forwards;

    /// <param name="layout">Where what stands.</param>
    /// <param name="costs">Tells what can be compared.</param>
    /// <param name="row">Where the winners go.</param>
    /// <param name="largestTotal">What no total exceeds.</param>
    public FusedDecision(FusedLayout layout, FusedCostLine<TLanes, TBytes, TWords, TTable> costs, RowMatches row, int largestTotal)
    {
        (this.layout, this.costs, this.row) = (layout, costs, row);
        words = (layout.Count + TLanes.Words - 1) / TLanes.Words * TLanes.Words;
        pathShift = BitOperations.Log2((uint)layout.Paths);
        var vectors = words / TLanes.Words;
        var bits = BitOperations.Log2((uint)vectors - 1 | 1) + 1;
        isNumbered = TLanes.Words > 1 && ((largestTotal + 1) << bits) <= None;
        numberBits = isNumbered ? bits : 0;
        found = new(layout.Width, numberBits, layout.Least);
        entries = new(sizeof(ushort) * (long)layout.Lanes + 64);
        around = isNumbered ? Neighbours() : Hiding();
        marks = Marks();
        rightLowest = new(sizeof(ushort) * (long)layout.LineBytes);
        rightColumn = new(sizeof(ushort) * (long)layout.LineBytes);
    }

    private ushort* Entries => (ushort*)entries.Start;

    /// <summary>Begins a row.</summary>
    /// <param name="forwards">Whether columns come from left to right.</param>
    public void Begin(bool forwards)
    {
        this.forwards = forwards;
        new Span<byte>(rightLowest.Start, (int)rightLowest.Bytes).Fill(byte.MaxValue);
    }

    /// <summary>Chooses the winner of one pixel.</summary>
    /// <param name="u">The column.</param>
    /// <param name="cost">The pixel's own costs.</param>
    /// <param name="here">This sweep's sums.</param>
    /// <param name="there">The other sweep's sums.</param>
    public void Choose(int u, byte* cost, byte* here, byte* there)
    {
        TWords least, second;
        if (!costs.IsWhole(u))
        {
            EnterSome(u, cost, here, there, out least, out second);
        }
        else if (forwards)
        {
            Enter<Rightwards>(u, cost, here, there, out least, out second);
        }
        else
        {
            Enter<Leftwards>(u, cost, here, there, out least, out second);
        }

        var lowest = TLanes.LeastWord(least);
        var winner = 0;
        if (lowest == None)
        {
            found.Put(u, winner, None, None, None, None);
            return;
        }

        if (isNumbered)
        {
            var (number, lane) = (lowest & (1 << numberBits) - 1, TLanes.FirstEqual(least, TLanes.AllWords(lowest)));
            winner = number * TLanes.Words + lane;
            var near = (ushort*)around.Start + (nint)lane * 2 * TLanes.Words;
            var numbers = TLanes.AddWords(TLanes.LoadWords(near + TLanes.Words), TLanes.AllWords((ushort)number));
            var mask = TLanes.AllWords((ushort)((1 << numberBits) - 1));
            var isNear = TLanes.AndWords(TLanes.LoadWords(near), TLanes.EqualWords(TLanes.AndWords(least, mask), numbers));
            second = TLanes.SelectWords(isNear, second, least);
        }
        else
        {
            winner = Find(lowest);
            second = Rivals(winner);
        }

        found.Put(
            u,
            winner,
            lowest,
            winner > 0 ? Entries[winner - 1] : None,
            winner < layout.Count - 1 ? Entries[winner + 1] : None,
            TLanes.LeastWord(second));
    }

    /// <summary>Ends a row: all its winners are known.</summary>
    public void End()
    {
        found.CopyTo(row);
        var lowest = (ushort*)rightLowest.Start + layout.Margin + layout.Width - 1;
        var column = (ushort*)rightColumn.Start + layout.Margin + layout.Width - 1;
        var winner = row.RightWinner;
        for (var r = 0; r < winner.Length; r++)
        {
            winner[r] = lowest[-r] < None ? column[-r] - r : RowMatches.None;
        }
    }

    public void Dispose()
    {
        entries.Dispose();
        around.Dispose();
        marks.Dispose();
        rightLowest.Dispose();
        rightColumn.Dispose();
    }

    // For each lane that a winner may stand in: ones at the lanes of it and its neighbours, and by how much their vectors' numbers differ from its own.
    private static AlignedMemory Neighbours()
    {
        var memory = AlignedMemory.Filled(2L * sizeof(ushort) * TLanes.Words * TLanes.Words, 0);
        for (var lane = 0; lane < TLanes.Words; lane++)
        {
            var near = (ushort*)memory.Start + 2 * lane * TLanes.Words;
            for (var i = lane - 1; i <= lane + 1; i++)
            {
                var number = i < 0 ? -1 : i / TLanes.Words;
                near[i - number * TLanes.Words] = ushort.MaxValue;
                near[TLanes.Words + i - number * TLanes.Words] = (ushort)number;
            }
        }

        return memory;
    }

    // Ones at three words; read at the right distance it hides a winner and its two neighbours.
    private AlignedMemory Hiding()
    {
        var memory = AlignedMemory.Filled(sizeof(ushort) * (2L * layout.Lanes + 64), 0);
        new Span<ushort>((ushort*)memory.Start + layout.Lanes - 1, 3).Fill(ushort.MaxValue);
        return memory;
    }

    private int Find(ushort lowest)
    {
        var all = TLanes.AllWords(lowest);
        for (nint k = 0; ; k += TLanes.Words)
        {
            var lane = TLanes.FirstEqual(TLanes.LoadWords(Entries + k), all);
            if (lane >= 0)
            {
                return (int)k + lane;
            }
        }
    }

    private TWords Rivals(int winner)
    {
        var hide = (ushort*)around.Start + layout.Lanes - winner;
        var least = TLanes.AllWords(None);
        for (nint k = 0; k < words; k += TLanes.Words)
        {
            least = TLanes.MinWords(least, TLanes.OrWords(TLanes.LoadWords(Entries + k), TLanes.LoadWords(hide + k)));
        }

        return least;
    }

    // What is set in the entries of every pixel: the numbers of their vectors, and all bits behind the last disparity.
    private AlignedMemory Marks()
    {
        var memory = new AlignedMemory(sizeof(ushort) * (long)words);
        for (var i = 0; i < words; i++)
        {
            ((ushort*)memory.Start)[i] = i >= layout.Count ? None : isNumbered ? (ushort)(i / TLanes.Words) : (ushort)0;
        }

        return memory;
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Enter<TDirection>(int u, byte* cost, byte* here, byte* there, out TWords leastOfLanes, out TWords secondOfLanes)
        where TDirection : struct, IDirection
    {
        nint end = words;
        nint planeBytes = layout.Planes == 1 ? 0 : layout.Lanes;
        nint first = layout.First(u);
        var lowest = (ushort*)rightLowest.Start + first;
        var column = (ushort*)rightColumn.Start + first;
        var entries = Entries;
        var mark = (ushort*)marks.Start;
        var here2 = here + planeBytes;
        var there2 = there + planeBytes;
        var (byCost, bySums) = (TLanes.AllWords((ushort)(1 << pathShift + numberBits)), TLanes.AllWords((ushort)(1 << numberBits)));
        var hereColumn = TLanes.AllWords((ushort)u);
        var (least, second) = (TLanes.AllWords(None), TLanes.AllWords(None));
        for (nint k = 0; k < end; k += TLanes.Words)
        {
            var sums = TLanes.AddWords(TLanes.Widen(here + k), TLanes.Widen(there + k));
            if (planeBytes != 0)
            {
                sums = TLanes.AddWords(sums, TLanes.AddWords(TLanes.Widen(here2 + k), TLanes.Widen(there2 + k)));
            }

            var total = TLanes.AddWords(TLanes.Multiply(TLanes.Widen(cost + k), byCost), TLanes.Multiply(sums, bySums));
            var entry = TLanes.OrWords(total, TLanes.LoadWords(mark + k));
            TLanes.StoreWords(entries + k, entry);
            second = TLanes.MinWords(second, TLanes.MaxWords(least, entry));
            least = TLanes.MinWords(least, entry);
            TakeRight<TDirection>(entry, hereColumn, lowest + k, column + k);
        }

        (leastOfLanes, secondOfLanes) = (least, second);
    }

    // The same where some disparities cannot be compared.
    private void EnterSome(int u, byte* cost, byte* here, byte* there, out TWords leastOfLanes, out TWords secondOfLanes)
    {
        var planeBytes = layout.Planes == 1 ? 0 : layout.Lanes;
        var first = layout.First(u);
        var (byCost, bySums) = (TLanes.AllWords((ushort)(1 << pathShift + numberBits)), TLanes.AllWords((ushort)(1 << numberBits)));
        var hereColumn = TLanes.AllWords((ushort)u);
        var without = TLanes.AllWords(costs.IsUsable(u) ? (ushort)0 : ushort.MaxValue);
        var incomparable = costs.IncomparableOf(u);
        var (least, second) = (TLanes.AllWords(None), TLanes.AllWords(None));
        for (nint k = 0; k < words; k += TLanes.Words)
        {
            var sums = TLanes.AddWords(TLanes.Widen(here + k), TLanes.Widen(there + k));
            if (planeBytes != 0)
            {
                sums = TLanes.AddWords(sums, TLanes.AddWords(TLanes.Widen(here + planeBytes + k), TLanes.Widen(there + planeBytes + k)));
            }

            var total = TLanes.AddWords(TLanes.Multiply(TLanes.Widen(cost + k), byCost), TLanes.Multiply(sums, bySums));
            var entry = TLanes.OrWords(total, TLanes.LoadWords((ushort*)marks.Start + k));
            entry = TLanes.OrWords(entry, TLanes.OrWords(without, Spread(incomparable + k)));
            TLanes.StoreWords(Entries + k, entry);
            second = TLanes.MinWords(second, TLanes.MaxWords(least, entry));
            least = TLanes.MinWords(least, entry);
            var lowest = (ushort*)rightLowest.Start + first + k;
            var column = (ushort*)rightColumn.Start + first + k;
            if (forwards)
            {
                TakeRight<Rightwards>(entry, hereColumn, lowest, column);
            }
            else
            {
                TakeRight<Leftwards>(entry, hereColumn, lowest, column);
            }
        }

        (leastOfLanes, secondOfLanes) = (least, second);
    }

    // The right picture's lowest entries so far, and the left columns that gave them; of equal ones the least column, which is the least disparity.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void TakeRight<TDirection>(TWords entry, TWords here, ushort* lowest, ushort* column)
        where TDirection : struct, IDirection
    {
        var before = TLanes.LoadWords(lowest);
        var lower = TLanes.MinWords(entry, before);
        TLanes.StoreWords(lowest, lower);
        TLanes.StoreWords(
            column,
            TDirection.IsRightwards
                ? TLanes.SelectWords(TLanes.EqualWords(lower, before), TLanes.LoadWords(column), here)
                : TLanes.SelectWords(TLanes.EqualWords(lower, entry), here, TLanes.LoadWords(column)));
    }

    // Bytes of ones as words of ones.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static TWords Spread(byte* mask)
    {
        var words = TLanes.Widen(mask);
        return TLanes.OrWords(words, TLanes.ShiftLeft(words, 8));
    }

    // Known when a loop is compiled, so that it asks nothing.
    private interface IDirection
    {
        static abstract bool IsRightwards { get; }
    }

    private readonly struct Rightwards : IDirection
    {
        public static bool IsRightwards => true;
    }

    private readonly struct Leftwards : IDirection
    {
        public static bool IsRightwards => false;
    }
}
