using System.Globalization;
using System.Text;

namespace Pairwright.Notebook.Drawing;

/// <summary>A drawing under construction: shapes in user units, first drawn lowest.</summary>
/// <remarks>
/// Shapes with a coordinate that is not finite are left out, and lines break there, so that a missing value is a gap.
/// No identifiers are used, so that many drawings can share a page.
/// </remarks>
internal sealed class Svg(double width, double height, string description)
{
    private readonly StringBuilder body = new();

    public double Width { get; } = width;

    public double Height { get; } = height;

    public Svg Line(double x1, double y1, double x2, double y2, Stroke stroke)
    {
        if (AreFinite(x1, y1, x2, y2))
        {
            body.Append($"<line x1=\"{N(x1)}\" y1=\"{N(y1)}\" x2=\"{N(x2)}\" y2=\"{N(y2)}\"{Attributes(stroke)}/>");
        }

        return this;
    }

    public Svg Polyline(IEnumerable<(double X, double Y)> points, Stroke stroke)
    {
        var path = new StringBuilder();
        var run = new List<(double X, double Y)>();
        foreach (var point in points.Append((X: double.NaN, Y: double.NaN)))
        {
            if (AreFinite(point.X, point.Y))
            {
                run.Add(point);
                continue;
            }

            if (run.Count > 1)
            {
                path.Append('M').AppendJoin('L', run.Select(p => $"{N(p.X)} {N(p.Y)}"));
            }

            run.Clear();
        }

        if (path.Length > 0)
        {
            body.Append($"<path d=\"{path}\" fill=\"none\" stroke-linejoin=\"round\"{Attributes(stroke)}/>");
        }

        return this;
    }

    public Svg Polygon(IEnumerable<(double X, double Y)> points, string fill, double opacity = 1, Stroke? stroke = null)
    {
        var corners = points.ToArray();
        if (corners.Length > 2 && corners.All(p => AreFinite(p.X, p.Y)))
        {
            var list = string.Join(' ', corners.Select(p => $"{N(p.X)},{N(p.Y)}"));
            body.Append($"<polygon points=\"{list}\" {Fill(fill, opacity)}{Attributes(stroke)}/>");
        }

        return this;
    }

    public Svg Rectangle(double x, double y, double width, double height, string fill, double opacity = 1, Stroke? stroke = null)
    {
        if (AreFinite(x, y, width, height) && width >= 0 && height >= 0)
        {
            body.Append($"<rect x=\"{N(x)}\" y=\"{N(y)}\" width=\"{N(width)}\" height=\"{N(height)}\" {Fill(fill, opacity)}{Attributes(stroke)}/>");
        }

        return this;
    }

    public Svg Circle(double x, double y, double radius, string fill, double opacity = 1, Stroke? stroke = null)
    {
        if (AreFinite(x, y))
        {
            body.Append($"<circle cx=\"{N(x)}\" cy=\"{N(y)}\" r=\"{N(radius)}\" {Fill(fill, opacity)}{Attributes(stroke)}/>");
        }

        return this;
    }

    /// <summary>A cross that marks a position without hiding it: four arms around an open middle.</summary>
    public Svg Cross(double x, double y, double reach, Stroke stroke)
    {
        var gap = reach * 0.35;
        return Line(x - reach, y, x - gap, y, stroke).Line(x + gap, y, x + reach, y, stroke)
            .Line(x, y - reach, x, y - gap, stroke).Line(x, y + gap, x, y + reach, stroke);
    }

    public Svg Text(
        double x, double y, string text, Anchor anchor = Anchor.Start, double size = 11, string colour = Ink.Text, bool bold = false, bool upright = false)
    {
        if (AreFinite(x, y))
        {
            var at = anchor switch { Anchor.Middle => " text-anchor=\"middle\"", Anchor.End => " text-anchor=\"end\"", _ => "" };
            var turn = upright ? $" transform=\"rotate(-90 {N(x)} {N(y)})\"" : "";
            var weight = bold ? " font-weight=\"600\"" : "";
            body.Append($"<text x=\"{N(x)}\" y=\"{N(y)}\" font-size=\"{N(size)}\" fill=\"{colour}\"{at}{weight}{turn}>{Markup.Escape(text)}</text>");
        }

        return this;
    }

    /// <summary>Text over a picture, readable on any level beneath it.</summary>
    public Svg Label(double x, double y, string text, Anchor anchor = Anchor.Start, double size = 11, string colour = "#ffffff")
    {
        // Six tenths of the size is the mean width of a letter, near enough for a backing.
        var width = 0.6 * size * text.Length + 6;
        var left = anchor switch { Anchor.Middle => x - width / 2, Anchor.End => x - width + 3, _ => x - 3 };
        return Rectangle(left, y - size, width, size + 4, "#10181e", 0.72).Text(x, y, text, anchor, size, colour);
    }

    public Svg Image(double x, double y, double width, double height, Raster raster)
    {
        // Enlarged patches must show their pixels, not a blur that the camera never saw.
        var rendering = raster.Width < width ? " style=\"image-rendering:pixelated\"" : "";
        body.Append(
            $"<image x=\"{N(x)}\" y=\"{N(y)}\" width=\"{N(width)}\" height=\"{N(height)}\" preserveAspectRatio=\"none\"{rendering} href=\"{raster.DataUri()}\"/>");
        return this;
    }

    /// <summary>Another drawing, clipped to its own size and scaled to a given width.</summary>
    public Svg Place(double x, double y, Svg drawing, double? width = null)
    {
        var scale = (width ?? drawing.Width) / drawing.Width;
        body.Append($"<svg x=\"{N(x)}\" y=\"{N(y)}\" width=\"{N(drawing.Width * scale)}\" height=\"{N(drawing.Height * scale)}\" ")
            .Append($"viewBox=\"0 0 {N(drawing.Width)} {N(drawing.Height)}\" overflow=\"hidden\">{drawing.body}</svg>");
        return this;
    }

    /// <summary>The drawing as an element that shrinks with a narrow page and never grows past its size.</summary>
    public Markup ToMarkup() => new(
        $"<svg xmlns=\"http://www.w3.org/2000/svg\" role=\"img\" viewBox=\"0 0 {N(Width)} {N(Height)}\" width=\"{N(Width)}\" "
        + $"style=\"max-width:100%;height:auto;font-family:inherit\"><title>{Markup.Escape(description)}</title>{body}</svg>");

    internal static string N(double value) => Math.Round(value, 2).ToString("0.##", CultureInfo.InvariantCulture);

    private static bool AreFinite(params ReadOnlySpan<double> values)
    {
        foreach (var value in values)
        {
            if (!double.IsFinite(value))
            {
                return false;
            }
        }

        return true;
    }

    private static string Fill(string fill, double opacity) => opacity < 1 ? $"fill=\"{fill}\" fill-opacity=\"{N(opacity)}\"" : $"fill=\"{fill}\"";

    private static string Attributes(Stroke? stroke) => stroke is null
        ? ""
        : $" stroke=\"{stroke.Colour}\" stroke-width=\"{N(stroke.Width)}\""
        + (stroke.Dashes is null ? "" : $" stroke-dasharray=\"{stroke.Dashes}\"")
        + (stroke.Opacity < 1 ? $" stroke-opacity=\"{N(stroke.Opacity)}\"" : "");
}
