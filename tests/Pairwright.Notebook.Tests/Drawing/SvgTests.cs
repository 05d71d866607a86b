using System.Xml.Linq;
using Pairwright.Notebook.Drawing;
using Xunit;

namespace Pairwright.Notebook.Tests.Drawing;

public sealed class SvgTests
{
    private static readonly XNamespace Ns = "http://www.w3.org/2000/svg";

    [Fact]
    public void A_missing_value_is_a_gap_in_a_line()
    {
        var svg = new Svg(100, 50, "profile").Polyline([(0, 1), (1, 2), (2, double.NaN), (3, 3), (4, 5), (5, double.PositiveInfinity), (6, 1)], new Stroke("#000"));

        Assert.Equal("M0 1L1 2M3 3L4 5", Parsed(svg).Element(Ns + "path")!.Attribute("d")!.Value);
    }

    [Fact]
    public void Shapes_without_a_place_are_left_out()
    {
        var svg = new Svg(10, 10, "nothing")
            .Line(0, 0, double.NaN, 1, new Stroke("#000"))
            .Circle(double.NaN, 0, 1, "#000")
            .Rectangle(0, 0, -1, 1, "#000")
            .Text(0, double.NaN, "x")
            .Polygon([(0, 0), (1, double.NaN), (1, 1)], "#000");

        Assert.Single(Parsed(svg).Elements());
    }

    [Fact]
    public void A_drawing_says_what_it_shows_to_those_who_cannot_see_it()
    {
        var svg = Parsed(new Svg(10, 10, "cost < 1 & distinct"));

        Assert.Equal("img", svg.Attribute("role")!.Value);
        Assert.Equal("cost < 1 & distinct", svg.Element(Ns + "title")!.Value);
    }

    [Fact]
    public void A_chart_places_values_by_its_axes()
    {
        var chart = new Chart("c", new Axis("u, px", 0, 10), new Axis("v, px", 0, 10), 54 + 12 + 100, 20 + 38 + 100).Dots([(5, 2)], "#000");

        var dot = Parsed(chart.ToSvg()).Descendants(Ns + "circle").Single();
        Assert.Equal("50", dot.Attribute("cx")!.Value);
        Assert.Equal("80", dot.Attribute("cy")!.Value);
    }

    [Fact]
    public void Equal_scale_widens_the_shorter_range_about_its_middle()
    {
        var chart = Chart.Isometric("c", new Axis("X, mm", 0, 10), new Axis("Z, mm", 0, 100), 400, 300);

        var (w, h) = chart.Plot;
        Assert.Equal((chart.XAxis.Most - chart.XAxis.Least) / w, (chart.YAxis.Most - chart.YAxis.Least) / h, 12);
        Assert.Equal(5, (chart.XAxis.Most + chart.XAxis.Least) / 2, 12);
        Assert.Equal((0, 100), (chart.YAxis.Least, chart.YAxis.Most));
    }

    private static XElement Parsed(Svg svg) => XElement.Parse(svg.ToMarkup().Text);
}
