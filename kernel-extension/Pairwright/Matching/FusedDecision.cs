using System.Numerics;
using System.Runtime.CompilerServices;

namespace Pairwright.Matching;

/// <summary>Chooses the winners of a row from both sweeps' sums, seen from the left and from the right picture.</summary>
/// <remarks>A total is the pixel's own cost once for each path and what the paths add; it stands in 16 bits. 65,535 marks what cannot be compared.</remarks>
internal sealed unsafe class FusedDecision<TLanes, TBytes, TWords, TTable> : IDisposable
    where TLanes : struct, ILanes<TBytes, TWords, TTable>
    where TBytes : unmanaged
    where TWords : unmanaged
    where TTable : unmanaged
{
    private readonly FusedLayout layout;
    private readonly FusedCostLine<TLanes, TBytes, TWords, TTable> costs;
    private readonly RowMatches row;
    private readonly AlignedMemory totals;
    private readonly AlignedMemory around;
    private readonly AlignedMemory rightLowest;
    private readonly AlignedMemory rightColumn;
    private readonly int words;
    private readonly int shift;
    private bool forwards;

    public FusedDecision(FusedLayout layout, FusedCostLine<TLanes, TBytes, TWords, TTable> costs, RowMatches row)
    {
        (this.layout, this.costs, this.row) = (layout, costs, row);
        words = (layout.Count + TLanes.Words - 1) / TLanes.Words * TLanes.Words;
        shift = BitOperations.Log2((uint)layout.Paths);
        totals = new(sizeof(ushort) * (long)layout.Lanes);

        // Ones at three words; read at the right distance it hides a winner and its two neighbours.
        around = AlignedMemory.Filled(sizeof(ushort) * (2L * layout.Lanes + 64), 0);
        new Span<ushort>((ushort*)around.Start + layout.Lanes - 1, 3).Fill(ushort.MaxValue);
        rightLowest = new(sizeof(ushort) * (long)layout.LineBytes);
        rightColumn = new(sizeof(ushort) * (long)layout.LineBytes);
    }

    private ushort* Totals => (ushort*)totals.Start;

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
        var lowest = costs.IsWhole(u) ? Total(cost, here, there) : TotalOfSome(u, cost, here, there);
        TakeRight(u);
        if (lowest == ushort.MaxValue)
        {
            (row.Winner[u], row.Lowest[u], row.Before[u], row.After[u], row.SecondLowest[u]) = (RowMatches.None, float.NaN, float.NaN, float.NaN, float.NaN);
            return;
        }

        var all = TLanes.AllWords(lowest);
        var winner = 0;
        for (nint k = 0; k < words; k += TLanes.Words)
        {
            var found = TLanes.FirstEqual(TLanes.LoadWords(Totals + k), all);
            if (found >= 0)
            {
                winner = (int)k + found;
                break;
            }
        }

        var hide = (ushort*)around.Start + layout.Lanes - winner;
        var second = TLanes.AllWords(ushort.MaxValue);
        for (nint k = 0; k < words; k += TLanes.Words)
        {
            second = TLanes.MinWords(second, TLanes.OrWords(TLanes.LoadWords(Totals + k), TLanes.LoadWords(hide + k)));
        }

        var secondLowest = TLanes.LeastWord(second);
        row.Winner[u] = layout.Least + winner;
        row.Lowest[u] = lowest;
        row.Before[u] = winner > 0 && Totals[winner - 1] is var before and < ushort.MaxValue ? before : float.NaN;
        row.After[u] = winner < layout.Count - 1 && Totals[winner + 1] is var after and < ushort.MaxValue ? after : float.NaN;
        row.SecondLowest[u] = secondLowest < ushort.MaxValue ? secondLowest : float.PositiveInfinity;
    }

    /// <summary>Ends a row: the right picture's winners are known.</summary>
    public void End()
    {
        var lowest = (ushort*)rightLowest.Start + layout.Margin + layout.Width - 1;
        var column = (ushort*)rightColumn.Start + layout.Margin + layout.Width - 1;
        var winner = row.RightWinner;
        for (var r = 0; r < winner.Length; r++)
        {
            winner[r] = lowest[-r] < ushort.MaxValue ? column[-r] - r : RowMatches.None;
        }
    }

    public void Dispose()
    {
        totals.Dispose();
        around.Dispose();
        rightLowest.Dispose();
        rightColumn.Dispose();
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private ushort Total(byte* cost, byte* here, byte* there)
    {
        var least = TLanes.AllWords(ushort.MaxValue);
        for (nint k = 0; k < words; k += TLanes.Words)
        {
            var total = Sum(cost + k, here + k, there + k);
            if (k + TLanes.Words > layout.Count)
            {
                var beyond = TLanes.Widen(costs.Beyond + k);
                total = TLanes.OrWords(total, TLanes.OrWords(beyond, TLanes.ShiftLeft(beyond, 8)));
            }

            TLanes.StoreWords(Totals + k, total);
            least = TLanes.MinWords(least, total);
        }

        return TLanes.LeastWord(least);
    }

    private ushort TotalOfSome(int u, byte* cost, byte* here, byte* there)
    {
        var least = TLanes.AllWords(ushort.MaxValue);
        var without = TLanes.AllWords(costs.IsUsable(u) ? (ushort)0 : ushort.MaxValue);
        var mask = costs.IncomparableOf(u);
        for (nint k = 0; k < words; k += TLanes.Words)
        {
            var hidden = TLanes.OrWords(TLanes.Widen(mask + k), TLanes.Widen(costs.Beyond + k));
            hidden = TLanes.OrWords(without, TLanes.OrWords(hidden, TLanes.ShiftLeft(hidden, 8)));
            var total = TLanes.OrWords(Sum(cost + k, here + k, there + k), hidden);
            TLanes.StoreWords(Totals + k, total);
            least = TLanes.MinWords(least, total);
        }

        return TLanes.LeastWord(least);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private TWords Sum(byte* cost, byte* here, byte* there)
    {
        var total = TLanes.ShiftLeft(TLanes.Widen(cost), shift);
        total = TLanes.AddWords(total, TLanes.AddWords(TLanes.Widen(here), TLanes.Widen(there)));
        return layout.Planes == 1
            ? total
            : TLanes.AddWords(total, TLanes.AddWords(TLanes.Widen(here + layout.Lanes), TLanes.Widen(there + layout.Lanes)));
    }

    // The right picture's lowest totals so far, and the left columns that gave them; of equal ones the least disparity, which is the least column.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void TakeRight(int u)
    {
        var first = layout.First(u);
        var lowest = (ushort*)rightLowest.Start + first;
        var column = (ushort*)rightColumn.Start + first;
        var here = TLanes.AllWords((ushort)u);
        for (nint k = 0; k < words; k += TLanes.Words)
        {
            var (total, before) = (TLanes.LoadWords(Totals + k), TLanes.LoadWords(lowest + k));
            var lower = TLanes.MinWords(total, before);
            var columns = TLanes.LoadWords(column + k);
            TLanes.StoreWords(
                column + k,
                forwards
                    ? TLanes.SelectWords(TLanes.EqualWords(lower, before), columns, here)
                    : TLanes.SelectWords(TLanes.EqualWords(lower, total), here, columns));
            TLanes.StoreWords(lowest + k, lower);
        }
    }
}
