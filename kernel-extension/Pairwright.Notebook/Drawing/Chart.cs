namespace Pairwright.Notebook.Drawing;

/// <summary>A chart with two axes. Shapes are given in the axes' units and are clipped to the plot.</summary>
internal sealed class Chart
{
    private const double Left = 54;
    private const double Right = 12;
    private const double TitleBand = 20;
    private const double AxisBand = 38;

    private readonly Axis x;
    private readonly Axis y;
    private readonly string description;
    private readonly double width;
    private readonly double height;
    private readonly Svg plot;
    private readonly List<(string Name, string Colour, bool IsLine)> legend = [];

    /// <param name="description">The chart's title, also read to those who cannot see it.</param>
    /// <param name="x">The axis to the right.</param>
    /// <param name="y">The axis upwards, or downwards where <paramref name="yDown"/>.</param>
    public Chart(string description, Axis x, Axis y, double width = 420, double height = 240, bool yDown = false)
    {
        (this.description, this.x, this.y, this.width, this.height, YDown) = (description, x, y, width, height, yDown);
        plot = new(width - Left - Right, height - TitleBand - AxisBand, description);
    }

    public bool YDown { get; }

    public Axis XAxis => x;

    public Axis YAxis => y;

    /// <summary>The size of the plot, without titles and labels.</summary>
    public (double Width, double Height) Plot => (plot.Width, plot.Height);

    /// <summary>A chart in which one unit is equally long on both axes: the range that is short is widened.</summary>
    public static Chart Isometric(string description, Axis x, Axis y, double width, double height, bool yDown = false)
    {
        var (plotWidth, plotHeight) = (width - Left - Right, height - TitleBand - AxisBand);
        var unit = Math.Max((x.Most - x.Least) / plotWidth, (y.Most - y.Least) / plotHeight);
        return new(description, Widened(x, unit * plotWidth), Widened(y, unit * plotHeight), width, height, yDown);
    }

    public Chart Line(IEnumerable<(double X, double Y)> points, Stroke stroke, string? name = null)
    {
        plot.Polyline(points.Select(p => (AtX(p.X), AtY(p.Y))), stroke);
        return Named(name, stroke.Colour, true);
    }

    public Chart Dots(IEnumerable<(double X, double Y)> points, string colour, double radius = 2, double opacity = 0.8, string? name = null)
    {
        foreach (var (px, py) in points)
        {
            plot.Circle(AtX(px), AtY(py), radius, colour, opacity);
        }

        return Named(name, colour, false);
    }

    /// <summary>An upright bar from the x axis, or from 0 where it is in range, to each value.</summary>
    public Chart Bar(double from, double to, double value, string colour, double opacity = 1, Stroke? stroke = null)
    {
        var foot = AtY(Math.Clamp(0, y.Least, y.Most));
        var top = AtY(value);
        if (double.IsFinite(top))
        {
            plot.Rectangle(AtX(from), Math.Min(foot, top), AtX(to) - AtX(from), Math.Abs(foot - top), colour, opacity, stroke);
        }

        return this;
    }

    public Chart Polygon(IEnumerable<(double X, double Y)> points, string fill, double opacity = 1, Stroke? stroke = null, string? name = null)
    {
        plot.Polygon(points.Select(p => (AtX(p.X), AtY(p.Y))), fill, opacity, stroke);
        return Named(name, fill, false);
    }

    /// <summary>An upright line over the whole plot.</summary>
    public Chart MarkX(double at, Stroke stroke, string? name = null)
    {
        plot.Line(AtX(at), 0, AtX(at), plot.Height, stroke);
        return Named(name, stroke.Colour, true);
    }

    /// <summary>A level line over the whole plot.</summary>
    public Chart MarkY(double at, Stroke stroke, string? name = null)
    {
        plot.Line(0, AtY(at), plot.Width, AtY(at), stroke);
        return Named(name, stroke.Colour, true);
    }

    public Chart Band(double fromX, double toX, string colour, double opacity, string? name = null)
    {
        plot.Rectangle(AtX(fromX), 0, AtX(toX) - AtX(fromX), plot.Height, colour, opacity);
        return Named(name, colour, false);
    }

    public Chart Text(double atX, double atY, string text, Anchor anchor = Anchor.Start, string colour = Ink.Text, double size = 11, double lift = 0)
    {
        plot.Text(AtX(atX), AtY(atY) - lift, text, anchor, size, colour);
        return this;
    }

    /// <summary>An entry of the legend for a colour.</summary>
    public Chart Key(string name, string colour) => Named(name, colour, false);

    /// <summary>A picture over the whole plot.</summary>
    public Chart Image(Raster raster)
    {
        plot.Image(0, 0, plot.Width, plot.Height, raster);
        return this;
    }

    public Svg ToSvg()
    {
        var drawing = new Svg(width, height, description);
        var (top, bottom) = (TitleBand, height - AxisBand);
        drawing.Text(Left, 13, description, size: 12, bold: true);
        drawing.Rectangle(Left, top, plot.Width, plot.Height, "#ffffff");

        var xStep = Ticks.Step(x.Most - x.Least, (int)(plot.Width / 70));
        foreach (var tick in x.IsHidden ? [] : Ticks.Within(x.Least, x.Most, (int)(plot.Width / 70)))
        {
            drawing.Line(Left + AtX(tick), top, Left + AtX(tick), bottom, Stroke.Hair);
            drawing.Text(Left + AtX(tick), bottom + 14, Ticks.Label(tick, xStep), Anchor.Middle, 10.5, Ink.Quiet);
        }

        var yStep = Ticks.Step(y.Most - y.Least, (int)(plot.Height / 38));
        foreach (var tick in y.IsHidden ? [] : Ticks.Within(y.Least, y.Most, (int)(plot.Height / 38)))
        {
            drawing.Line(Left, top + AtY(tick), Left + plot.Width, top + AtY(tick), Stroke.Hair);
            drawing.Text(Left - 5, top + AtY(tick) + 3.5, Ticks.Label(tick, yStep), Anchor.End, 10.5, Ink.Quiet);
        }

        drawing.Place(Left, top, plot);
        drawing.Rectangle(Left, top, plot.Width, plot.Height, "none", stroke: Stroke.Frame);
        drawing.Text(Left + plot.Width / 2, height - 8, x.Title, Anchor.Middle, 11, Ink.Quiet);
        drawing.Text(12, top + plot.Height / 2, y.Title, Anchor.Middle, 11, Ink.Quiet, upright: true);
        DrawLegend(drawing, top);
        return drawing;
    }

    private void DrawLegend(Svg drawing, double top)
    {
        if (legend.Count == 0)
        {
            return;
        }

        var boxWidth = 30 + 6.1 * legend.Max(entry => entry.Name.Length);
        var left = Left + plot.Width - boxWidth - 4;
        drawing.Rectangle(left, top + 4, boxWidth, 15 * legend.Count + 5, Ink.Paper, 0.88, Stroke.Hair);
        for (var i = 0; i < legend.Count; i++)
        {
            var middle = top + 14 + 15 * i;
            if (legend[i].IsLine)
            {
                drawing.Line(left + 5, middle, left + 20, middle, new(legend[i].Colour, 2));
            }
            else
            {
                drawing.Rectangle(left + 8, middle - 4, 8, 8, legend[i].Colour);
            }

            drawing.Text(left + 25, middle + 4, legend[i].Name, size: 10.5);
        }
    }

    private static Axis Widened(Axis axis, double span)
    {
        var middle = (axis.Least + axis.Most) / 2;
        return axis with { Least = middle - span / 2, Most = middle + span / 2 };
    }

    private Chart Named(string? name, string colour, bool isLine)
    {
        if (name is not null)
        {
            legend.Add((name, colour, isLine));
        }

        return this;
    }

    private double AtX(double value) => x.Share(value) * plot.Width;

    private double AtY(double value) => (YDown ? y.Share(value) : 1 - y.Share(value)) * plot.Height;
}
