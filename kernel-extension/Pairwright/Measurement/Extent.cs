namespace Pairwright.Measurement;

/// <summary>How far points reach along one direction of a surface.</summary>
/// <param name="Length">The length, in millimetres.</param>
/// <param name="Middle">Where its middle lies, in millimetres.</param>
/// <param name="Sigma">The standard uncertainty of the length, in millimetres.</param>
internal readonly record struct Extent(double Length, double Middle, double Sigma)
{
    private const int Strips = 25;

    /// <summary>The extent along the first coordinate: medians of the nearest and of the farthest points of strips side by side.</summary>
    /// <remarks>Medians, so that a few strips that end early or late do not count. Each end is known to half a spacing of the points: a rectangular distribution.</remarks>
    public static Extent Of(IReadOnlyList<(double Along, double Beside)> points, double pitch)
    {
        var (least, most) = (points.Min(point => point.Beside), points.Max(point => point.Beside));
        var count = Math.Clamp(points.Count / 50, 1, Strips);
        var near = Enumerable.Repeat(double.PositiveInfinity, count).ToArray();
        var far = Enumerable.Repeat(double.NegativeInfinity, count).ToArray();
        foreach (var (along, beside) in points)
        {
            var strip = most > least ? Math.Min((int)((beside - least) / (most - least) * count), count - 1) : 0;
            (near[strip], far[strip]) = (Math.Min(near[strip], along), Math.Max(far[strip], along));
        }

        var (start, end) = (Middling(near), Middling(far));
        return new(end - start + pitch, (start + end) / 2, pitch / Math.Sqrt(6));
    }

    private static double Middling(double[] ends)
    {
        var known = ends.Where(double.IsFinite).Order().ToArray();
        return (known[(known.Length - 1) / 2] + known[known.Length / 2]) / 2;
    }
}
