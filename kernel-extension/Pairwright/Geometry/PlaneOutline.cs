namespace Pairwright.Geometry;

/// <summary>The border of what a camera sees, on a plane: a closed chain of points. It may bulge or cave in as the lens does.</summary>
internal sealed class PlaneOutline
{
    private readonly (double X, double Y)[] points;

    public PlaneOutline(IEnumerable<(double X, double Y)> points)
    {
        this.points = [.. points];
        Top = this.points.Min(point => point.Y);
        Bottom = this.points.Max(point => point.Y);
        Left = this.points.Min(point => point.X);
        Right = this.points.Max(point => point.X);
    }

    public double Left { get; }

    public double Top { get; }

    public double Right { get; }

    public double Bottom { get; }

    /// <summary>The longest stretch of the line at a height y that lies inside; empty (low above high) where none does.</summary>
    public (double Low, double High) Span(double y)
    {
        var crossings = new List<double>(4);
        for (var i = 0; i < points.Length; i++)
        {
            var (a, b) = (points[i], points[(i + 1) % points.Length]);
            if (a.Y <= y != b.Y <= y)
            {
                crossings.Add(a.X + (y - a.Y) / (b.Y - a.Y) * (b.X - a.X));
            }
        }

        crossings.Sort();
        var longest = (Low: double.PositiveInfinity, High: double.NegativeInfinity);
        for (var i = 0; i + 1 < crossings.Count; i += 2)
        {
            if (longest.High < longest.Low || crossings[i + 1] - crossings[i] > longest.High - longest.Low)
            {
                longest = (crossings[i], crossings[i + 1]);
            }
        }

        return longest;
    }
}
