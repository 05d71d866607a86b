using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Notebook.Drawing;

/// <summary>A drawing over a picture: shapes are given in the picture's pixels, (0, 0) the centre of the top-left one.</summary>
internal sealed class PictureCanvas
{
    private readonly double scale;
    private readonly Svg inner;
    private readonly PictureSize size;
    private readonly string description;

    public PictureCanvas(string description, PictureSize size, Raster? raster, double width = 440)
    {
        (this.description, this.size) = (description, size);
        scale = width / size.Width;
        inner = new(width, size.Height * scale, description);
        if (raster is null)
        {
            inner.Rectangle(0, 0, inner.Width, inner.Height, "#e7eaea");
        }
        else
        {
            inner.Image(0, 0, inner.Width, inner.Height, raster);
        }
    }

    public double Width => inner.Width;

    public double Height => inner.Height;

    /// <summary>A picture, shown white where <see cref="Pictures.White"/> says.</summary>
    public static PictureCanvas Of(string description, Picture picture, double width = 440, double? white = null) =>
        new(description, picture.Size, Pictures.Reduced(picture, (int)Math.Ceiling(width * 1.15), white ?? Pictures.White(picture)), width);

    public double X(double u) => (u + 0.5) * scale;

    public double Y(double v) => (v + 0.5) * scale;

    public PictureCanvas Line(double u1, double v1, double u2, double v2, Stroke stroke)
    {
        inner.Line(X(u1), Y(v1), X(u2), Y(v2), stroke);
        return this;
    }

    public PictureCanvas Polyline(IEnumerable<(double U, double V)> points, Stroke stroke)
    {
        inner.Polyline(points.Select(p => (X(p.U), Y(p.V))), stroke);
        return this;
    }

    public PictureCanvas Polygon(IEnumerable<(double U, double V)> points, string fill, double opacity, Stroke? stroke = null)
    {
        inner.Polygon(points.Select(p => (X(p.U), Y(p.V))), fill, opacity, stroke);
        return this;
    }

    public PictureCanvas Dot(double u, double v, string colour, double radius = 1.5, double opacity = 1)
    {
        inner.Circle(X(u), Y(v), radius, colour, opacity);
        return this;
    }

    /// <summary>A ring with a dark rim, seen on light and dark ground.</summary>
    public PictureCanvas Ring(double u, double v, string colour, double radius = 4)
    {
        inner.Circle(X(u), Y(v), radius, "none", stroke: new("#10181e", 3, Opacity: 0.6)).Circle(X(u), Y(v), radius, "none", stroke: new(colour, 1.6));
        return this;
    }

    public PictureCanvas Cross(double u, double v, string colour, double reach = 7)
    {
        inner.Cross(X(u), Y(v), reach, new("#10181e", 3, Opacity: 0.6)).Cross(X(u), Y(v), reach, new(colour, 1.5));
        return this;
    }

    public PictureCanvas Arrow(double u, double v, double du, double dv, Stroke stroke)
    {
        var (x, y) = (X(u), Y(v));
        var (tipX, tipY) = (x + du, y + dv);
        var length = Math.Sqrt(du * du + dv * dv);
        inner.Line(x, y, tipX, tipY, stroke);
        if (length > 3)
        {
            var (ex, ey) = (du / length * 3, dv / length * 3);
            inner.Polygon([(tipX, tipY), (tipX - ex - ey / 2, tipY - ey + ex / 2), (tipX - ex + ey / 2, tipY - ey - ex / 2)], stroke.Colour);
        }

        return this;
    }

    public PictureCanvas Label(double u, double v, string text, Anchor anchor = Anchor.Start, string colour = "#ffffff", double dx = 0, double dy = 0)
    {
        inner.Label(X(u) + dx, Y(v) + dy, text, anchor, 10.5, colour);
        return this;
    }

    /// <summary>The drawing with its heading above and pixel numbers along two edges.</summary>
    public Svg ToSvg()
    {
        const double left = 30;
        const double top = 20;
        var drawing = new Svg(left + Width + 6, top + Height + 18, description);
        drawing.Text(left, 13, description, size: 12, bold: true);
        drawing.Place(left, top, inner);
        drawing.Rectangle(left, top, Width, Height, "none", stroke: Stroke.Frame);
        foreach (var tick in Ticks.Within(0, size.Width - 1, (int)(Width / 90)))
        {
            drawing.Line(left + X(tick), top + Height, left + X(tick), top + Height + 3, Stroke.Frame);
            drawing.Text(left + X(tick), top + Height + 13, Ticks.Label(tick, 1), Anchor.Middle, 9.5, Ink.Quiet);
        }

        foreach (var tick in Ticks.Within(0, size.Height - 1, (int)(Height / 60)))
        {
            drawing.Line(left - 3, top + Y(tick), left, top + Y(tick), Stroke.Frame);
            drawing.Text(left - 5, top + Y(tick) + 3, Ticks.Label(tick, 1), Anchor.End, 9.5, Ink.Quiet);
        }

        return drawing;
    }
}
