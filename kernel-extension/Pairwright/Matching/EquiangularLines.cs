using System.Numerics;

namespace Pairwright.Matching;

/// <summary>The meeting point of two lines of equal and opposite slope; see <see cref="SubPixel.Equiangular"/>.</summary>
/// <remarks>Shimizu and Okutomi, Precise sub-pixel estimation on area-based matching, ICCV 2001, equation for absolute differences.</remarks>
internal sealed class EquiangularLines : SubPixel
{
    public override string Name => "equiangular";

    // Census costs on simulated slanted planes: up to 0.15 px, to and fro once a pixel.
    public override double PullSigmaPx => 0.1;

    public override float Offset(float before, float lowest, float after)
    {
        var steeper = Math.Max(before, after) - lowest;
        return steeper > 0 ? (before - after) / (2 * steeper) : 0;
    }

    internal override void Offsets(ReadOnlySpan<float> before, ReadOnlySpan<float> lowest, ReadOnlySpan<float> after, Span<float> offsets)
    {
        var u = 0;
        for (; u <= offsets.Length - Vector<float>.Count; u += Vector<float>.Count)
        {
            var (below, least, above) = (new Vector<float>(before[u..]), new Vector<float>(lowest[u..]), new Vector<float>(after[u..]));
            var steeper = Vector.Max(below, above) - least;
            var offset = (below - above) / (2 * steeper);
            Vector.ConditionalSelect(Vector.GreaterThan(steeper, Vector<float>.Zero), offset, Vector<float>.Zero).CopyTo(offsets[u..]);
        }

        for (; u < offsets.Length; u++)
        {
            offsets[u] = Offset(before[u], lowest[u], after[u]);
        }
    }
}
