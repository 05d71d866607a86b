using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>How far a surface departs from its own plane.</summary>
public sealed class Flatness
{
    private Flatness(MeasuredValue rms, MeasuredValue peakToValley) => (Rms, PeakToValley) = (rms, peakToValley);

    /// <summary>The root mean square of the heights over the plane.</summary>
    public MeasuredValue Rms { get; }

    /// <summary>The greatest height over the plane minus the least.</summary>
    public MeasuredValue PeakToValley { get; }

    /// <summary>Both figures.</summary>
    public override string ToString() => $"RMS {Rms}; peak to valley {PeakToValley}";

    /// <summary>From the points themselves: their noise is part of the figures.</summary>
    internal static Flatness OfPoints(MeasuredPoints points)
    {
        var fit = PlaneFit.To(points);
        double[] Heights(IReadOnlyList<Vector3D> positions)
        {
            var plane = Plane.To(positions, _ => 1);
            return [.. positions.Select(plane.Height)];
        }

        var sample = points.Sample;
        var heights = Heights(points.Positions);
        var sigmas = Enumerable.Range(0, points.Count).Select(i => Math.Sqrt(Math.Max(0, fit.Normal.Dot(points.Covariance(i) * fit.Normal)))).ToArray();

        // The extremes are taken at the same two points under every rig, so that they do not jump from point to point.
        var (highest, lowest) = (IndexOf(heights, heights.Max()), IndexOf(heights, heights.Min()));
        var (high, low) = (Nearest(points, sample, highest), Nearest(points, sample, lowest));
        var rms = RootMeanSquare(heights);
        var varied = points.Varied.Select(heights, Heights);
        var rmsSigma = rms == 0 ? 0 : Math.Sqrt(heights.Zip(sigmas, (height, sigma) => height * height * sigma * sigma).Sum()) / (points.Count * rms);
        var peakVariants = varied.Select(heights[highest] - heights[lowest], h => h[high] - h[low]);
        return new(
            varied.Select(rms, RootMeanSquare).ToMeasured(value => value, rmsSigma, "mm"),
            peakVariants.ToMeasured(value => value, Math.Sqrt(sigmas[highest] * sigmas[highest] + sigmas[lowest] * sigmas[lowest]), "mm"));
    }

    /// <summary>From figures that were worked out already.</summary>
    internal static Flatness Of(MeasuredValue rms, MeasuredValue peakToValley) => new(rms, peakToValley);

    private static double RootMeanSquare(double[] heights) => Math.Sqrt(heights.Sum(height => height * height) / heights.Length);

    private static int IndexOf(double[] values, double value) => Array.IndexOf(values, value);

    private static int Nearest(MeasuredPoints points, int[] sample, int index) =>
        Enumerable.Range(0, sample.Length).MinBy(i => (points.Positions[sample[i]] - points.Positions[index]).Norm);
}
