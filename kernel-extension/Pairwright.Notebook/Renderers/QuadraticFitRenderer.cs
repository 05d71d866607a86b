using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A plank's cup, bow and twist with its cross-section and its form over the plane.</summary>
internal sealed class QuadraticFitRenderer : Renderer<QuadraticFit>
{
    private const int MostDots = 900;

    public override string Plain(QuadraticFit fit) => Lines(
        $"Second-order surface through {fit.Points.Count} points, {Value(fit.Width)} across, {Value(fit.Length)} along",
        $"sagitta across (cup) {fit.SagittaAcross()}",
        $"sagitta along (bow) {fit.SagittaAlong()}",
        $"fourth corner (twist) {fit.FourthCorner()}");

    public override Card Draw(QuadraticFit fit)
    {
        var (cup, bow, twist) = (fit.SagittaAcross(), fit.SagittaAlong(), fit.FourthCorner());
        return new Card("Second-order surface over its plane", "Heights count towards the camera; ± is one standard uncertainty.")
            .Table(
                ["from the fit's coefficients", "value", "random", "common"],
                [
                    Row("cup: sagitta across", cup),
                    Row("bow: sagitta along", bow),
                    Row("twist: fourth corner over the plane of the other three", twist),
                    Row("width", fit.Width),
                    Row("length", fit.Length),
                ])
            .Row(CrossSection(fit, cup), Form(fit))
            .Facts(
                ("points", $"{fit.Points.Count}, of which {Numbers.Percent(fit.OutlierShare)} have no say"),
                ("random part rests on", fit.RandomPartBasis))
            .Caption("The points of the whole surface are laid onto one cross-section, twist and bow taken off; single points are noisy, the curve is not: it rests on all of them.");
    }

    private static string[] Row(string name, MeasuredValue value) =>
        [name, Value(value), Numbers.Significant(value.RandomSigma, 2, value.Unit), Numbers.Significant(value.CommonSigma, 2, value.Unit)];

    private static string Value(MeasuredValue value) => Numbers.WithSigma(value.Value, value.StandardUncertainty, value.Unit);

    private static IEnumerable<(double U, double V, double Height)> Places(QuadraticFit fit)
    {
        var stride = Math.Max(1, fit.Points.Count / MostDots);
        for (var i = 0; i < fit.Points.Count; i += stride)
        {
            var offset = fit.Points.Positions[i] - fit.Origin;
            yield return (fit.Across.Dot(offset), fit.Along.Dot(offset), fit.Normal.Dot(offset));
        }
    }

    private static Svg CrossSection(QuadraticFit fit, MeasuredValue cup)
    {
        var c = fit.Coefficients;
        var half = fit.Width.Value / 2;
        var middle = Places(fit).Select(place => place.U).DefaultIfEmpty(0).Average();
        double Curve(double u) => c[0] + c[3] * u * u;
        var dots = Places(fit).Select(place => (place.U, place.Height - c[1] * place.U - c[2] * place.V - c[4] * place.U * place.V - c[5] * place.V * place.V)).ToArray();
        var heights = dots.Select(dot => dot.Item2).Order().ToArray();
        var (low, high) = heights.Length == 0 ? (-1.0, 1.0) : (heights[heights.Length / 50], heights[heights.Length - 1 - heights.Length / 50]);
        var (from, to) = (middle - half, middle + half);
        var chart = new Chart("Cross-section: points, fit and chord", Axis.Over("across, mm", [from, to]), Axis.Over("height, mm", [low, high, Curve(from), Curve(to), Curve(middle)], room: 0.1), 480, 260);
        double Chord(double u) => Curve(from) + (u - from) / (to - from) * (Curve(to) - Curve(from));
        chart.Dots(dots, Ink.Quiet, 1.3, 0.45, "points");
        chart.Line(Enumerable.Range(0, 61).Select(i => from + i * (to - from) / 60).Select(u => (u, Curve(u))), new(Ink.Left, 2), "fit");
        chart.Line([(from, Chord(from)), (to, Chord(to))], new(Ink.Right, 1.2, "5 3"), "chord");
        chart.Line([(middle, Chord(middle)), (middle, Curve(middle))], new(Ink.NotMet, 2), $"sagitta {Numbers.WithSigma(cup.Value, cup.StandardUncertainty, "mm")}");
        return chart.ToSvg();
    }

    private static Svg Form(QuadraticFit fit)
    {
        var c = fit.Coefficients;
        var places = Places(fit).ToArray();
        var (middleU, middleV) = (places.Select(p => p.U).DefaultIfEmpty(0).Average(), places.Select(p => p.V).DefaultIfEmpty(0).Average());
        var (w, l) = (fit.Width.Value / 2, fit.Length.Value / 2);
        double Height(double u, double v) => c[0] + c[1] * u + c[2] * v + c[3] * u * u + c[4] * u * v + c[5] * v * v;
        const int columns = 60;
        var rows = Math.Clamp((int)(columns * w / l), 8, 60);
        var grid = Enumerable.Range(0, rows * columns)
            .Select(i => Height(middleU + w * (2.0 * (i / columns) / (rows - 1) - 1), middleV + l * (2.0 * (i % columns) / (columns - 1) - 1)))
            .ToArray();
        var (least, most) = (grid.Min(), grid.Max());
        var raster = Raster.From(columns, rows, (x, y) => Ramp.Values.At(most > least ? (grid[y * columns + x] - least) / (most - least) : 0.5));
        const double width = 330;
        var height = Math.Clamp(width * w / l, 50, 200);
        var drawing = new Svg(width + 90, Math.Max(height + 46, 150), "Fitted form over the plane");
        drawing.Text(4, 13, "Fitted form over the plane", size: 12, bold: true);
        drawing.Image(4, 22, width, height, raster).Rectangle(4, 22, width, height, "none", stroke: Stroke.Frame);
        drawing.Text(4 + width / 2, height + 37, "along →, across ↓", Anchor.Middle, 10.5, Ink.Quiet);
        return drawing.Place(width + 20, 4, ScaleBar.Upright(Ramp.Values, least, Math.Max(most, least + 1e-6), "mm", drawing.Height - 8, withNoValue: false));
    }
}
