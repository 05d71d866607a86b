namespace Pairwright.Matching;

/// <summary>No sub-pixel estimate.</summary>
internal sealed class WholeDisparity : SubPixel
{
    public override string Name => "none";

    public override float Offset(float before, float lowest, float after) => 0;

    internal override void Offsets(ReadOnlySpan<float> before, ReadOnlySpan<float> lowest, ReadOnlySpan<float> after, Span<float> offsets) => offsets.Clear();
}
