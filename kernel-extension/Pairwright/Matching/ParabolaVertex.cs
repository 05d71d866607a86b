using System.Numerics;

namespace Pairwright.Matching;

/// <summary>The vertex of the parabola through three totals; see <see cref="SubPixel.Parabola"/>.</summary>
internal sealed class ParabolaVertex : SubPixel
{
    public override string Name => "parabola";

    // Census costs on simulated slanted planes: up to 0.15 px, to and fro once a pixel.
    public override double PullSigmaPx => 0.1;

    public override float Offset(float before, float lowest, float after)
    {
        var curvature = before + after - 2 * lowest;
        return curvature > 0 ? (before - after) / (2 * curvature) : 0;
    }

    internal override void Offsets(ReadOnlySpan<float> before, ReadOnlySpan<float> lowest, ReadOnlySpan<float> after, Span<float> offsets)
    {
        var u = 0;
        for (; u <= offsets.Length - Vector<float>.Count; u += Vector<float>.Count)
        {
            var (below, least, above) = (new Vector<float>(before[u..]), new Vector<float>(lowest[u..]), new Vector<float>(after[u..]));
            var curvature = below + above - 2 * least;
            var offset = (below - above) / (2 * curvature);
            Vector.ConditionalSelect(Vector.GreaterThan(curvature, Vector<float>.Zero), offset, Vector<float>.Zero).CopyTo(offsets[u..]);
        }

        for (; u < offsets.Length; u++)
        {
            offsets[u] = Offset(before[u], lowest[u], after[u]);
        }
    }
}
