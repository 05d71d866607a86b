namespace Pairwright.Matching;

/// <summary>A cost that has looked at a pair and now gives the costs of its rows, from several threads at once.</summary>
public interface ICostRows
{
    /// <summary>Fills the costs of one row.</summary>
    /// <param name="v">The row.</param>
    /// <param name="range">The disparities asked for.</param>
    /// <param name="costs">
    /// Width × <c>range.Count</c> numbers: that of column u and disparity d stands at <c>u · range.Count + d − range.Least</c>. The lower
    /// the better, not below zero; positive infinity where u − d lies outside the right picture or either pixel is not usable.
    /// </param>
    void Row(int v, DisparityRange range, Span<float> costs);
}
