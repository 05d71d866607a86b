namespace Pairwright.Matching;

/// <summary>Fills the confidences of a row of matches.</summary>
/// <param name="row">The row.</param>
/// <param name="confidence">One number per column to fill: 0 to 1, the higher the surer, NaN where nothing could be compared.</param>
public delegate void RowConfidence(RowMatches row, Span<float> confidence);
