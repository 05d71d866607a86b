namespace Pairwright.Matching;

/// <summary>Compares a stretch of a left row with the stretch of the right row that one disparity puts under it.</summary>
/// <param name="left">Grey levels of the left picture on the 8-bit scale (a level of 12 bits is a multiple of 1/16).</param>
/// <param name="right">Grey levels of the right picture, as many: <c>right[i]</c> is what <c>left[i]</c> matches at this disparity.</param>
/// <param name="costs">As many numbers to fill: the lower the better, not below zero.</param>
public delegate void RowComparison(ReadOnlySpan<float> left, ReadOnlySpan<float> right, Span<float> costs);
