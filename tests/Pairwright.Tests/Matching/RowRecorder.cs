using System.Collections.Concurrent;
using Pairwright.Matching;

namespace Pairwright.Tests.Matching;

/// <summary>A check that refuses nothing and keeps what the optimisation found, row by row.</summary>
internal sealed class RowRecorder : Check
{
    public ConcurrentDictionary<int, Found> Rows { get; } = new();

    public override void Apply(RowMatches row) => Rows[row.V] = new(
        row.Winner.ToArray(), row.RightWinner.ToArray(), row.Lowest.ToArray(), row.Before.ToArray(), row.After.ToArray(), row.SecondLowest.ToArray());

    internal sealed record Found(int[] Winner, int[] RightWinner, float[] Lowest, float[] Before, float[] After, float[] SecondLowest);
}
