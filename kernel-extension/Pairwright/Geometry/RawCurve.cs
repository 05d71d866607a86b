using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>An epipolar line as the lens forms it: a chain of raw pixels, nearly evenly spaced, all on the picture.</summary>
/// <remarks>Immutable. Empty where the line misses the picture or the lens model's valid field.</remarks>
public sealed class RawCurve
{
    internal RawCurve(View view, ImmutableArray<RawCurvePoint> points) => (View, Points) = (view, points);

    /// <summary>The view in whose picture the curve lies.</summary>
    public View View { get; }

    /// <summary>The chain, in order; for the curve of a pixel, from far to near.</summary>
    public ImmutableArray<RawCurvePoint> Points { get; }

    /// <summary>Whether no part of the curve lies on the picture.</summary>
    public bool IsEmpty => Points.IsEmpty;

    /// <summary>The length of the chain, in pixels.</summary>
    public double LengthPx
    {
        get
        {
            var length = 0.0;
            for (var i = 1; i < Points.Length; i++)
            {
                var (a, b) = (Points[i - 1].Raw, Points[i].Raw);
                length += Math.Sqrt((b.U - a.U) * (b.U - a.U) + (b.V - a.V) * (b.V - a.V));
            }

            return length;
        }
    }
}
