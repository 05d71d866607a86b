using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The search for one pixel's match along its epipolar curve.</summary>
public static class CurveSearching
{
    /// <summary>Compares a pixel's window with windows along its epipolar curve, in the pictures as the lenses formed them.</summary>
    /// <param name="pair">A pair whose rig is known.</param>
    /// <param name="from">A pixel of the left picture; its whole window must lie on the picture and be usable.</param>
    /// <param name="cost">How to compare windows; ZNCC over 11 × 11 pixels when left out.</param>
    /// <param name="nearestMm">The nearest depth along the left camera's axis, in millimetres; as near as the right picture reaches when left out.</param>
    /// <param name="farthestMm">The farthest depth, in millimetres; infinity when left out.</param>
    /// <remarks>
    /// At each depth the right window is what a plane facing the left camera would show, so that lens distortion, verging and magnification are
    /// followed; slant is not. Samples are half a pixel apart; the lowest is refined to a fraction of a pixel by parabolas.
    /// </remarks>
    /// <exception cref="UserErrorException">The rig is not known, the window leaves the picture, the cost has no window, or the depths are not in order.</exception>
    public static CostCurve Search(this StereoPair pair, RawPixel from, Cost? cost = null, double? nearestMm = null, double? farthestMm = null)
    {
        ArgumentNullException.ThrowIfNull(pair);
        if (pair.Rig is null)
        {
            throw new UserErrorException("The pair has no rig, so its epipolar curves are not known; read it with the rig that took it.");
        }

        if ((cost ?? Cost.Zncc()) is not WindowCost windowCost)
        {
            throw new UserErrorException($"The cost '{cost}' compares single pixels, which no search along a curve can tell apart; give one with a window, such as Cost.Zncc().");
        }

        if (nearestMm is { } near && !(near > 0 && near < (farthestMm ?? double.PositiveInfinity)) || farthestMm is { } far && !(far > 0))
        {
            throw new UserErrorException($"Depths from {nearestMm} mm to {farthestMm} mm are not in order; give the nearest, above zero, and then a larger farthest.");
        }

        return new CurveSearch(pair, pair.Rig, from, windowCost).Run(nearestMm ?? 0, farthestMm ?? double.PositiveInfinity);
    }
}
