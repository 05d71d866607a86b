using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>How many values fall into each of many equal bins.</summary>
internal static class Histograms
{
    public static Svg Of(string heading, string unit, string what, IReadOnlyCollection<double> values, double least, double most, int bins = 40, double width = 440, double height = 200) =>
        Of(heading, unit, what, Counts(values, least, most, bins), least, most, width, height);

    public static Svg Of(string heading, string unit, string what, IReadOnlyList<int> counts, double least, double most, double width = 440, double height = 200)
    {
        var step = (most - least) / counts.Count;
        var chart = new Chart(heading, new(unit, least, most), Axis.Over(what, counts.Select(c => (double)c), fromZero: true), width, height);
        foreach (var (bin, count) in counts.Index())
        {
            chart.Bar(least + bin * step, least + (bin + 1) * step, count, Ink.Left, 0.75);
        }

        return chart.ToSvg();
    }

    /// <summary>Values outside the range are not counted; the upper end belongs to the last bin.</summary>
    public static int[] Counts(IEnumerable<double> values, double least, double most, int bins)
    {
        var counts = new int[bins];
        foreach (var value in values)
        {
            if (value >= least && value <= most)
            {
                counts[Math.Min((int)((value - least) / (most - least) * bins), bins - 1)]++;
            }
        }

        return counts;
    }
}
