using Pairwright.Imaging;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Both pictures beside one another with level guides; folded away, one over the other and their difference.</summary>
internal sealed class StereoPairRenderer : Renderer<StereoPair>
{
    public override bool HasPicture => true;

    public override string Plain(StereoPair pair) => Lines(
    [
        $"Stereo pair{(pair.Name.Length == 0 ? "" : " " + pair.Name)}, left {pair.Left.Size} px, right {pair.Right.Size} px, {pair.Left.SignificantBits} bits"
        + (pair.Rig is null ? ", rig not known" : $", baseline {Numbers.Text(pair.Rig.BaselineMm, 2, "mm")}"),
        .. pair.Warnings.Select(warning => "Attention: " + warning),
    ]);

    public override Raster Picture(StereoPair pair) => PairPictures.Beside(pair.Left, pair.Right);

    public override Card Draw(StereoPair pair)
    {
        var white = PairPictures.White(pair.Left, pair.Right);
        var name = pair.Name.Length == 0 ? "" : $" {pair.Name}";
        var card = new Card($"Stereo pair{name}, as the lenses formed it", "Raw pixels; the level guides are there to compare heights, matching points of raw pictures need not share a row.")
            .Warnings(pair.Warnings)
            .Row(Side("Left (reference)", pair.Left, white), Side("Right", pair.Right, white))
            .Facts(Facts(pair));
        if (white < (1 << pair.Left.SignificantBits) - 1)
        {
            card.Note($"The pictures are dark: shown white is level {Numbers.Text(white, 0)} of {(1 << pair.Left.SignificantBits) - 1}.");
        }

        if (pair.Left.Size == pair.Right.Size)
        {
            var (size, left, right) = (pair.Left.Size, pair.Left, pair.Right);
            var over = new PictureCanvas("Red left, cyan right", size, PairPictures.RedCyan(left, right), 430).ToSvg();
            var difference = new PictureCanvas("Left minus right, grey = equal", size, PairPictures.Difference(left, right), 430).ToSvg();
            card.Details("One over the other, and the difference", new Markup($"<div class=\"pw-row\"><div>{over.ToMarkup()}</div><div>{difference.ToMarkup()}</div></div>"));
        }

        return card.From(pair.Provenance);
    }

    private static Svg Side(string heading, Picture picture, double white)
    {
        var canvas = PictureCanvas.Of(heading, picture, 440, white);
        for (var row = 1; row < 8; row++)
        {
            var v = row * picture.Size.Height / 8.0;
            canvas.Line(-0.5, v, picture.Size.Width - 0.5, v, new(Ink.Overlay, 1, "2 6", 0.75));
        }

        return canvas.ToSvg();
    }

    private static IEnumerable<(string, string)> Facts(StereoPair pair)
    {
        foreach (var (name, picture) in new[] { ("left", pair.Left), ("right", pair.Right) })
        {
            yield return ($"{name} picture", $"{picture.Size} px, {picture.SignificantBits} bits{(picture.HasColour ? ", colour" : "")}");
            yield return ($"{name}: mean level, saturated", $"{Numbers.Percent(picture.MeanLevel / ((1 << picture.SignificantBits) - 1))} of full scale, {Numbers.Percent(picture.SaturatedShare)} of pixels");
            yield return ($"{name}: sharpness", Numbers.Text(picture.Sharpness, 3, "per px"));
        }

        if (pair.Skew is { } skew)
        {
            yield return ("right taken after left", Numbers.Text(skew.TotalMilliseconds, 3, "ms"));
        }

        yield return ("rig", pair.Rig is null ? "not known" : $"baseline {Numbers.Text(pair.Rig.BaselineMm, 2, "mm")}");
    }
}
