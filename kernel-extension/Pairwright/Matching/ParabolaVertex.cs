namespace Pairwright.Matching;

/// <summary>The vertex of the parabola through three totals; see <see cref="SubPixel.Parabola"/>.</summary>
internal sealed class ParabolaVertex : SubPixel
{
    public override string Name => "parabola";

    public override float Offset(float before, float lowest, float after)
    {
        var curvature = before + after - 2 * lowest;
        return curvature > 0 ? (before - after) / (2 * curvature) : 0;
    }
}
