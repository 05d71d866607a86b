namespace Pairwright.Matching;

/// <summary>No sub-pixel estimate.</summary>
internal sealed class WholeDisparity : SubPixel
{
    public override string Name => "none";

    public override float Offset(float before, float lowest, float after) => 0;
}
