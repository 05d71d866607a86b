namespace Pairwright.Matching;

/// <summary>An aggregation that has looked at a pair and now works on its costs, band by band.</summary>
public interface IAggregator
{
    /// <summary>Replaces the costs of a band by aggregated ones, in place.</summary>
    /// <param name="costs">
    /// The band. Where its first or last row is not the picture's, only rows <see cref="Aggregation.ReachPx"/> away from it are looked at
    /// afterwards, and they must not depend on where the band begins or ends.
    /// </param>
    /// <param name="stop">Asks to stop.</param>
    void Apply(CostVolume costs, CancellationToken stop);
}
