namespace Pairwright.Calibration;

/// <summary>Which figures stand out from the rest.</summary>
internal static class Outliers
{
    public const string Rule =
        "A view is outlying when its RMS residual exceeds the views' median by more than four robust standard deviations (1.4826 times the median absolute deviation) and by more than half of the median.";

    public static bool[] Among(IReadOnlyList<double> figures)
    {
        var median = Median(figures);
        var spread = 1.4826 * Median([.. figures.Select(figure => Math.Abs(figure - median))]);
        return [.. figures.Select(figure => figure > median + 4 * spread && figure > 1.5 * median)];
    }

    public static double Median(IReadOnlyList<double> figures)
    {
        var sorted = figures.Order().ToArray();
        return (sorted[(sorted.Length - 1) / 2] + sorted[sorted.Length / 2]) / 2;
    }
}
