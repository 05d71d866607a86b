using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Disparities in colours, what became of the pixels without one, confidence, histogram and one row's profile.</summary>
internal sealed class DisparityMapRenderer : Renderer<DisparityMap>
{
    private static readonly (DisparityLabel Label, string Name, byte Red, byte Green, byte Blue)[] Outcomes =
    [
        (DisparityLabel.Measured, "measured", 235, 238, 236),
        (DisparityLabel.NoMatch, "no match", 60, 70, 82),
        (DisparityLabel.Occluded, "hidden from the right", 76, 134, 196),
        (DisparityLabel.RangeEnd, "at an end of the range", 196, 60, 60),
        (DisparityLabel.Speckle, "patch too small", 224, 160, 48),
        (DisparityLabel.Unusable, "not usable", 190, 170, 210),
        (DisparityLabel.Filled, "filled in", 130, 190, 140),
    ];

    public override bool HasPicture => true;

    public override string Plain(DisparityMap map)
    {
        var (least, most) = map.Disparity.Quantiles();
        return Lines(
            $"Disparity map, {map.Size} px, recipe {map.Recipe.Id}, searched {map.Range.Least} to {Numbers.Text(map.Range.Most, 0, "px")}",
            $"measured {Numbers.Percent(map.MatchedShare)} of usable pixels, at an end of the range {Numbers.Percent(map.RangeEndShare)}",
            $"98 % of the disparities lie between {Numbers.Text(least, 2)} and {Numbers.Text(most, 2, "px")}"
            + (map.Sigma is null ? "; their uncertainty is not known" : $"; median σ {Numbers.Text(MapDrawings.Median(map.Sigma), 3, "px")}"));
    }

    public override Raster Picture(DisparityMap map)
    {
        var (least, most) = MapDrawings.Range(map.Disparity);
        return Pictures.Coloured(map.Disparity, Ramp.Values, least, most);
    }

    public override Card Draw(DisparityMap map)
    {
        var range = MapDrawings.Range(map.Disparity);
        var row = MapDrawings.TellingRow(map.Disparity);
        var card = new Card("Disparity map", $"d = u_left − u_right at each pixel of the rectified left picture, {map.Size} px; recipe {map.Recipe.Id}");
        if (map.RangeEndShare > 0.01)
        {
            card.Warning($"{Numbers.Percent(map.RangeEndShare)} of usable pixels matched best at an end of the search range {map.Range.Least} to {map.Range.Most} px; the scene may reach beyond it.");
        }

        card.Facts(
            ("measured, of usable pixels", Numbers.Percent(map.MatchedShare)),
            ("at an end of the range", Numbers.Percent(map.RangeEndShare)),
            ("searched", $"{map.Range.Least} to {map.Range.Most} px"),
            ("median σ of a disparity (random)", map.Sigma is null ? "not known" : Numbers.Text(MapDrawings.Median(map.Sigma), 3, "px")),
            ("errors correlated up to", Numbers.Text(map.CorrelationLengthPx, 0, "px")),
            ("rows of the two pictures, apart", map.RowOffset is { Windows: > 0 } rows ? $"{Numbers.WithSigma(rows.RmsPx, rows.SigmaPx, "px")} RMS, allowed for" : "not estimated"),
            ("time", Numbers.Significant(map.Elapsed.TotalSeconds, 3, "s")));
        card.Row(
            MapDrawings.Coloured("Disparity", map.Disparity, Ramp.Values, range, "px", canvas => canvas.Line(-0.5, row, map.Size.Width - 0.5, row, new("#ffffff", 1, "5 4"))),
            MapDrawings.Coloured("Confidence: how clearly the best stands out", map.Confidence, Ramp.Shares, (0, 1), "0 to 1"));
        card.Row(Labels(map), PictureCanvas.Of("Left picture", map.Pair.Left, MapDrawings.Width).ToSvg());
        card.Row(
            MapDrawings.Histogram("How often each disparity occurs", map.Disparity, "disparity, px", map.Range.Least, map.Range.Most),
            MapDrawings.Profile($"Disparity along row {row} (dashed in the map)", map.Disparity, row, "px", range));
        if (map.Sigma is not null)
        {
            card.Row(MapDrawings.Coloured("Standard uncertainty of the disparity, random part", map.Sigma, Ramp.Spreads, (0, Math.Max(1e-3, map.Sigma.Quantiles().High)), "px"));
        }

        card.Caption("Striped pixels have no value. Near depth edges, in glare and on plain surfaces a match can be confidently wrong.");
        return card.Details("The recipe", new(Card.TableOf(["part", "setting"], map.Recipe.ToString().Split("; ").Select(part => part.Split(": ", 2)), 2))).From(map.Provenance);
    }

    private static Svg Labels(DisparityMap map)
    {
        const double width = MapDrawings.Width;
        var (w, h) = Pictures.Fitted(map.Size.Width, map.Size.Height, (int)width);
        var raster = Raster.From(w, h, (u, v) =>
        {
            var label = map.Labels[(2 * u + 1) * map.Size.Width / (2 * w), (2 * v + 1) * map.Size.Height / (2 * h)];
            var outcome = Outcomes[(int)label];
            return (outcome.Red, outcome.Green, outcome.Blue);
        });
        var picture = new PictureCanvas("What became of each pixel", map.Size, raster, width).ToSvg();
        var drawing = new Svg(picture.Width + 140, picture.Height, "What became of each pixel").Place(0, 0, picture);
        var y = 30.0;
        foreach (var (label, name, red, green, blue) in Outcomes.Where(outcome => map.Labels.Share(outcome.Label) > 0))
        {
            drawing.Rectangle(picture.Width + 6, y - 9, 11, 11, $"rgb({red},{green},{blue})", stroke: Stroke.Frame);
            drawing.Text(picture.Width + 22, y, name, size: 10.5).Text(picture.Width + 22, y + 13, Numbers.Percent(map.Labels.Share(label)), size: 10.5, colour: Ink.Quiet);
            y += 34;
        }

        return drawing;
    }
}
