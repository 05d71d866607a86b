namespace Pairwright.Measurement;

/// <summary>The direction of a strip of points by its two long edges.</summary>
/// <param name="Angle">From the direction that was given as lengthwise, positive from "along" towards "beside", in radians.</param>
/// <param name="Sigma">Its standard uncertainty, in radians.</param>
internal readonly record struct LongEdges(double Angle, double Sigma)
{
    private const int Strips = 40;
    private const int Turns = 4;

    /// <summary>Finds the direction.</summary>
    /// <param name="points">Places in the plane, "along" roughly lengthwise.</param>
    /// <param name="pitch">The points' spacing; the edges are known to half of it.</param>
    /// <remarks>
    /// Short pieces side by side along the strip each have an outermost point on either edge; the edge's slope is the median of the slopes between
    /// all pairs of them (Theil 1950; Sen 1968), so that a missing corner or a few stray points do not turn it, as they turn the principal axes.
    /// </remarks>
    public static LongEdges Of(IReadOnlyList<(double Along, double Beside)> points, double pitch)
    {
        var (angle, sigma) = (0.0, 0.0);
        for (var turn = 0; turn < Turns; turn++)
        {
            var (sine, cosine) = Math.SinCos(angle);
            var turned = points.Select(p => (Along: p.Along * cosine + p.Beside * sine, Beside: p.Beside * cosine - p.Along * sine)).ToArray();
            var (near, far) = Ends(turned);
            var (nearSlope, nearSigma) = Slope(near, pitch);
            var (farSlope, farSigma) = Slope(far, pitch);
            angle += Math.Atan((nearSlope + farSlope) / 2);
            sigma = Math.Sqrt(nearSigma * nearSigma + farSigma * farSigma) / 2;
        }

        return new(angle, sigma);
    }

    private static ((double Along, double Beside)[] Near, (double Along, double Beside)[] Far) Ends((double Along, double Beside)[] points)
    {
        var (least, most) = (points.Min(p => p.Along), points.Max(p => p.Along));
        var count = Math.Clamp(points.Length / 50, 3, Strips);
        var pieces = points.GroupBy(p => Math.Min((int)((p.Along - least) / (most - least) * count), count - 1)).ToArray();
        return (Array.ConvertAll(pieces, piece => piece.MinBy(p => p.Beside)), Array.ConvertAll(pieces, piece => piece.MaxBy(p => p.Beside)));
    }

    private static (double Slope, double Sigma) Slope((double Along, double Beside)[] ends, double pitch)
    {
        var slopes = new List<double>();
        for (var i = 0; i < ends.Length; i++)
        {
            for (var j = 0; j < i; j++)
            {
                var run = ends[i].Along - ends[j].Along;
                if (run != 0)
                {
                    slopes.Add((ends[i].Beside - ends[j].Beside) / run);
                }
            }
        }

        var slope = Middle(slopes);
        var middle = Middle(ends.Select(end => end.Beside - slope * end.Along));
        var mean = ends.Average(end => end.Along);
        var scatter = Math.Max(1.4826 * Middle(ends.Select(end => Math.Abs(end.Beside - slope * end.Along - middle))), pitch / Math.Sqrt(12));

        // For normal errors the median of slopes has 3/π of the efficiency of least squares (Sen 1968).
        return (slope, scatter / Math.Sqrt(3 / Math.PI * ends.Sum(end => (end.Along - mean) * (end.Along - mean))));
    }

    private static double Middle(IEnumerable<double> values)
    {
        var sorted = values.Order().ToArray();
        return (sorted[(sorted.Length - 1) / 2] + sorted[sorted.Length / 2]) / 2;
    }
}
