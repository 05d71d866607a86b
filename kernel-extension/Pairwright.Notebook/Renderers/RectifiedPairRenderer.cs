using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Both rectified pictures with guides along the rows, the geometry, and what of the raw pictures was lost.</summary>
internal sealed class RectifiedPairRenderer : Renderer<RectifiedPair>
{
    public override bool HasPicture => true;

    public override string Plain(RectifiedPair pair) => Lines(
        $"Rectified pair, {pair.Size} px",
        pair.Geometry is { } g ? Geometry(g) : "geometry not known: disparity but no depth",
        pair.Rectification is { } r ? $"of the raw pictures kept: left {Numbers.Percent(r.UsableShare(View.Left))}, right {Numbers.Percent(r.UsableShare(View.Right))}" : null);

    public override Raster Picture(RectifiedPair pair) => PairPictures.Beside(pair.Left, pair.Right);

    public override Card Draw(RectifiedPair pair)
    {
        var white = PairPictures.White(pair.Left, pair.Right);
        var card = new Card("Rectified pair", $"Rectified pixels, {pair.Size}; matching points share a row: whatever a guide crosses on the left it must cross on the right.")
            .Row(Side("Left (reference)", pair.Left, white), Side("Right", pair.Right, white));
        if (pair.Geometry is { } g)
        {
            card.Facts(
                ("focal length f", Numbers.Text(g.FocalPixels, 3, "px")),
                ("baseline b", Numbers.Text(g.BaselineMm, 3, "mm")),
                ("offset of the principal points", Numbers.Text(g.OffsetPixels, 3, "px")),
                ("depth along the rectified left axis", Depth(g)));
        }
        else
        {
            card.Warning("focal length and baseline are not known, so there will be disparities but no depths.");
        }

        if (pair.Rectification is { } r)
        {
            card.Facts(
                ("fit", r.Fit == RectificationFit.Cropped ? "cropped to what both pictures fill" : "everything kept, empty pixels marked"),
                ("lost of the left picture", Numbers.Percent(1 - r.UsableShare(View.Left))),
                ("lost of the right picture", Numbers.Percent(1 - r.UsableShare(View.Right))),
                ("left picture turned by", Numbers.Text(r.TurnDegrees, 3) + "°"));
        }

        if (pair.Left.Size == pair.Right.Size)
        {
            var over = new PictureCanvas("Red left, cyan right", pair.Size, PairPictures.RedCyan(pair.Left, pair.Right), 430).ToSvg();
            card.Details("One over the other", over.ToMarkup());
        }

        return card.From(pair.Provenance);
    }

    private static string Depth(RectifiedGeometry g)
    {
        var product = Numbers.Text(g.FocalPixels * g.BaselineMm, 1, "mm·px");
        return Math.Abs(g.OffsetPixels) < 0.0005
            ? $"Z = {product} / d"
            : $"Z = {product} / (d {(g.OffsetPixels < 0 ? "−" : "+")} {Numbers.Text(Math.Abs(g.OffsetPixels), 3, "px")})";
    }

    private static string Geometry(RectifiedGeometry g) =>
        $"focal length {Numbers.Text(g.FocalPixels, 3, "px")}, baseline {Numbers.Text(g.BaselineMm, 3, "mm")}, offset {Numbers.Text(g.OffsetPixels, 3, "px")}";

    private static Svg Side(string heading, Picture picture, double white)
    {
        var canvas = PictureCanvas.Of(heading, picture, 440, white);
        for (var row = 1; row < 12; row++)
        {
            var v = row * picture.Size.Height / 12.0;
            canvas.Line(-0.5, v, picture.Size.Width - 0.5, v, new(Ink.Bright[row % 4], 1, Opacity: 0.85));
        }

        return canvas.ToSvg();
    }
}
