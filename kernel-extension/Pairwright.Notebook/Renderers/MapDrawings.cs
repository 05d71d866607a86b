using Pairwright.Imaging;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Drawings that disparity and depth maps share.</summary>
internal static class MapDrawings
{
    /// <summary>The width of a map's drawing: two with their scale bars fit beside one another.</summary>
    public const double Width = 360;

    /// <summary>The range of colours: what the middle 98 % of the values span, so that a few wrong ones do not wash the picture out.</summary>
    public static (double Least, double Most) Range(ScalarMap map, double lowShare = 0.01, double highShare = 0.99)
    {
        var (low, high) = map.Quantiles(lowShare, highShare);
        return double.IsNaN(low) ? (0, 1) : high > low ? (low, high) : (low - 0.5, low + 0.5);
    }

    /// <summary>A map in colours with its scale bar; shapes may be drawn over it.</summary>
    public static Svg Coloured(string heading, ScalarMap map, Ramp ramp, (double Least, double Most) range, string unit, Action<PictureCanvas>? over = null, double width = Width)
    {
        var canvas = new PictureCanvas(heading, map.Size, Pictures.Coloured(map, ramp, range.Least, range.Most, (int)width), width);
        over?.Invoke(canvas);
        var picture = canvas.ToSvg();
        return new Svg(picture.Width + 8 + ScaleBar.Width, picture.Height, heading)
            .Place(0, 0, picture)
            .Place(picture.Width + 8, 0, ScaleBar.Upright(ramp, range.Least, range.Most, unit, picture.Height));
    }

    /// <summary>The values along one row; a gap where there is none.</summary>
    public static Svg Profile(string heading, ScalarMap map, int row, string axis, (double Least, double Most) range, ScalarMap? sigma = null, double width = 480, double height = 220)
    {
        var room = 0.08 * (range.Most - range.Least);
        var chart = new Chart(heading, new("column, px", 0, map.Size.Width - 1), new(axis, range.Least - room, range.Most + room), width, height);
        if (sigma is not null)
        {
            Edge(2);
            Edge(-2);
        }

        return chart.Line(Enumerable.Range(0, map.Size.Width).Select(u => ((double)u, (double)map[u, row])), new(Ink.Left, 1.3), sigma is null ? null : "value").ToSvg();

        void Edge(int factor) => chart.Line(
            Enumerable.Range(0, map.Size.Width).Select(u => ((double)u, (double)map[u, row] + factor * sigma![u, row])),
            new(Ink.Right, 0.8, Opacity: 0.7),
            factor > 0 ? "± 2 σ, random" : null);
    }

    /// <summary>How often each value occurs.</summary>
    public static Svg Histogram(string heading, ScalarMap map, string unit, double least, double most, double width = 400, double height = 220) =>
        Histograms.Of(heading, unit, "pixels", Histograms.Counts(Present(map), least, most, 80), least, most, width, height);

    public static IEnumerable<double> Present(ScalarMap map)
    {
        foreach (var value in map.Values.ToArray())
        {
            if (!float.IsNaN(value))
            {
                yield return value;
            }
        }
    }

    /// <summary>The middle one of the values; NaN where there are none.</summary>
    public static double Median(ScalarMap map) => map.Quantiles(0.5, 0.5).Low;

    /// <summary>The row whose profile says most: of nine across the map the one with the most values.</summary>
    public static int TellingRow(ScalarMap map) => Enumerable.Range(1, 9)
        .Select(i => i * map.Size.Height / 10)
        .OrderByDescending(row => map.Row(row).ToArray().Count(value => !float.IsNaN(value)))
        .ThenBy(row => Math.Abs(row - map.Size.Height / 2))
        .First();
}
