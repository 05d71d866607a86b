using System.Runtime.Intrinsics;

namespace Pairwright.Matching;

/// <summary>What the fused decision found in a row, as 16-bit words, until the row is whole.</summary>
/// <param name="width">How many columns.</param>
/// <param name="numberBits">How many low bits of an entry are no part of its total.</param>
/// <param name="least">The least disparity.</param>
internal sealed class FoundColumns(int width, int numberBits, int least)
{
    private readonly ushort[] winners = new ushort[width];
    private readonly ushort[] lowest = new ushort[width];
    private readonly ushort[] before = new ushort[width];
    private readonly ushort[] after = new ushort[width];
    private readonly ushort[] second = new ushort[width];

    /// <summary>Puts one column down; 65,535 stands for no entry.</summary>
    public void Put(int u, int winner, ushort lowestEntry, ushort beforeEntry, ushort afterEntry, ushort secondEntry)
    {
        winners[u] = (ushort)winner;
        lowest[u] = lowestEntry;
        before[u] = beforeEntry;
        after[u] = afterEntry;
        second[u] = secondEntry;
    }

    /// <summary>Brings the row into the form that checks know.</summary>
    public void CopyTo(RowMatches row)
    {
        Totals(lowest, row.Lowest, float.NaN);
        Totals(before, row.Before, float.NaN);
        Totals(after, row.After, float.NaN);
        Totals(second, row.SecondLowest, float.PositiveInfinity);
        var winner = row.Winner;
        for (var u = 0; u < winner.Length; u++)
        {
            winner[u] = lowest[u] == ushort.MaxValue ? RowMatches.None : least + winners[u];
            row.SecondLowest[u] = lowest[u] == ushort.MaxValue ? float.NaN : row.SecondLowest[u];
        }
    }

    private void Totals(ReadOnlySpan<ushort> entries, Span<float> totals, float none)
    {
        var u = 0;
        var (missing, nothing) = (Vector256.Create(none), Vector256.Create((uint)ushort.MaxValue));
        for (; u <= entries.Length - Vector128<ushort>.Count; u += Vector128<ushort>.Count)
        {
            var (lower, upper) = Vector128.Widen(Vector128.Create(entries[u..]));
            var words = Vector256.Create(lower, upper);
            var values = Vector256.ConvertToSingle((words >>> numberBits).AsInt32());
            Vector256.ConditionalSelect(Vector256.Equals(words, nothing).AsSingle(), missing, values).CopyTo(totals[u..]);
        }

        for (; u < entries.Length; u++)
        {
            totals[u] = entries[u] == ushort.MaxValue ? none : entries[u] >> numberBits;
        }
    }
}
