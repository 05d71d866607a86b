namespace Pairwright.Matching;

/// <summary>The meeting point of two lines of equal and opposite slope; see <see cref="SubPixel.Equiangular"/>.</summary>
/// <remarks>Shimizu and Okutomi, Precise sub-pixel estimation on area-based matching, ICCV 2001, equation for absolute differences.</remarks>
internal sealed class EquiangularLines : SubPixel
{
    public override string Name => "equiangular";

    public override float Offset(float before, float lowest, float after)
    {
        var steeper = Math.Max(before, after) - lowest;
        return steeper > 0 ? (before - after) / (2 * steeper) : 0;
    }
}
