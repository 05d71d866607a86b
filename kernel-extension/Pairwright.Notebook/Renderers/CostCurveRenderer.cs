using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Cost against position along the curve, best and second best, both windows magnified, and where all that is in the pictures.</summary>
internal sealed class CostCurveRenderer : Renderer<CostCurve>
{
    public override string Plain(CostCurve curve) => Lines(
        $"Search along the epipolar curve of raw left pixel ({Pixel(curve.From)}) px with {curve.Cost}: {curve.Samples.Count} positions",
        curve.BestIndex < 0 ? "no match" : $"match ({Pixel(curve.Match)}) px ± {Numbers.Text(curve.SigmaPx, 3, "px")} along the curve, depth {Depth(curve)}",
        $"second best over best (peak ratio) {Numbers.Significant(curve.PeakRatio, 3)}: {Judgement(curve)}");

    public override Card Draw(CostCurve curve)
    {
        var card = new Card(
            $"Cost along the epipolar curve of left pixel ({Pixel(curve.From)}) px",
            $"Raw pixels; {curve.Cost}; every position stands for one depth along the left camera's axis.");
        if (!curve.Distinct)
        {
            card.Warning(curve.Objection);
        }

        card.Facts(
            ("match in the right picture", curve.BestIndex < 0 ? "none" : $"({Pixel(curve.Match)}) px"),
            ("standard uncertainty along the curve", Numbers.Text(curve.SigmaPx, 3, "px")),
            ("depth, ± its random part", Depth(curve)),
            ("second best over best", Numbers.Significant(curve.PeakRatio, 3) + " (1 is ambiguous)"),
            ("verdict", Judgement(curve)));
        var white = PairPictures.White(curve.Pair.Left, curve.Pair.Right);
        card.Row(CostChart(curve), Patches(curve, white));
        card.Row(InLeft(curve, white), InRight(curve, white));
        return card.From(curve.Pair.Provenance);
    }

    private static string Judgement(CostCurve curve) => curve.BestIndex < 0 ? "no match" : curve.Distinct ? "distinct" : "not to be believed";

    private static string Pixel(RawPixel pixel) => $"{Numbers.Text(pixel.U, 2)}, {Numbers.Text(pixel.V, 2)}";

    // The depth's random part: what one standard uncertainty along the curve does to it, by the samples around the match.
    private static string Depth(CostCurve curve)
    {
        if (curve.BestIndex < 0 || double.IsNaN(curve.MatchDepthMm))
        {
            return Numbers.NoValue;
        }

        var before = curve.Samples[Math.Max(curve.BestIndex - 1, 0)];
        var after = curve.Samples[Math.Min(curve.BestIndex + 1, curve.Samples.Count - 1)];
        var slope = Math.Abs((after.DepthMm - before.DepthMm) / (after.AlongPx - before.AlongPx));
        return Numbers.WithSigma(curve.MatchDepthMm, slope * curve.SigmaPx, "mm");
    }

    private static Svg CostChart(CostCurve curve)
    {
        var chart = new Chart(
            "Cost: the lower, the more alike",
            Axis.Over("along the curve, px (left: infinity, right: near)", curve.Samples.Select(sample => sample.AlongPx), room: 0.01),
            Axis.Over("cost", curve.Samples.Select(sample => sample.Cost), fromZero: true),
            600,
            260);
        chart.Line(curve.Samples.Select(sample => (sample.AlongPx, sample.Cost)), new(Ink.Left, 1.4));
        Mark(curve.BestIndex, Ink.Met, "best");
        Mark(curve.SecondBestIndex, Ink.NotMet, "second best");
        return chart.ToSvg();

        void Mark(int index, string colour, string name)
        {
            if (index >= 0)
            {
                var sample = curve.Samples[index];
                chart.MarkX(sample.AlongPx, new(colour, 1, "4 3"), $"{name}, {Numbers.Text(sample.DepthMm, 0, "mm")}").Dots([(sample.AlongPx, sample.Cost)], colour, 4, 1);
            }
        }
    }

    private static Svg Patches(CostCurve curve, double white)
    {
        const double side = 130;
        var drawing = new Svg(2 * side + 20, side + 40, "Both windows, magnified");
        drawing.Text(0, 13, "Both windows, magnified", size: 12, bold: true);
        Place(0, curve.LeftPatch, "left");
        Place(side + 14, curve.RightPatch, "right, at the match");
        return drawing;

        void Place(double x, Picture? patch, string name)
        {
            if (patch is null)
            {
                drawing.Rectangle(x, 20, side, side, Ink.Panel).Text(x + side / 2, 20 + side / 2, "none", Anchor.Middle, colour: Ink.Quiet);
            }
            else
            {
                drawing.Image(x, 20, side, side * patch.Size.Height / patch.Size.Width, Pictures.Reduced(patch.Grey, patch.Size.Width, patch.Size.Height, 1, patch.Size.Width, 255 / white));
            }

            drawing.Rectangle(x, 20, side, side, "none", stroke: Stroke.Frame).Text(x, side + 34, name, size: 10.5, colour: Ink.Quiet);
        }
    }

    private static Svg InLeft(CostCurve curve, double white) =>
        PictureCanvas.Of("Left: the pixel", curve.Pair.Left, 380, white).Cross(curve.From.U, curve.From.V, Ink.Overlay, 9).ToSvg();

    private static Svg InRight(CostCurve curve, double white)
    {
        var canvas = PictureCanvas.Of("Right: curve, match and second best", curve.Pair.Right, 380, white);
        var chain = curve.Samples.Select(sample => (sample.Position.U, sample.Position.V)).ToArray();
        canvas.Polyline(chain, new("#10181e", 2.6, Opacity: 0.45)).Polyline(chain, new(Ink.Overlay, 1.2));
        if (curve.SecondBestIndex >= 0)
        {
            var second = curve.Samples[curve.SecondBestIndex].Position;
            canvas.Ring(second.U, second.V, "#ff7a59", 6).Label(second.U, second.V, "second", colour: "#ffb59f", dx: 9, dy: -6);
        }

        if (curve.BestIndex >= 0)
        {
            canvas.Cross(curve.Match.U, curve.Match.V, "#7ae582", 9).Label(curve.Match.U, curve.Match.V, "match", colour: "#b6f5bb", dx: 9, dy: 16);
        }

        return canvas.ToSvg();
    }
}
