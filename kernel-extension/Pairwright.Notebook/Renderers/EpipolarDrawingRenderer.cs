using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Points in one picture, their lines in the other, and how far the matches lie from them.</summary>
internal sealed class EpipolarDrawingRenderer : Renderer<EpipolarDrawing>
{
    public override string Plain(EpipolarDrawing drawing) => drawing.Right.IsEmpty
        ? $"{drawing.Left.Length} left points and their epipolar lines in the right picture"
        : $"{drawing.Left.Length} matches; right points lie {Numbers.Text(drawing.RmsPx, 3, "px")} RMS from the epipolar lines of the left ones";

    public override Card Draw(EpipolarDrawing drawing)
    {
        var white = PairPictures.White(drawing.Pair.Left, drawing.Pair.Right);
        var left = PictureCanvas.Of("Left: the points", drawing.Pair.Left, 440, white);
        var right = PictureCanvas.Of("Right: where each must lie", drawing.Pair.Right, 440, white);
        var colours = Ink.Bright;
        var numbered = drawing.Left.Length <= 12;
        for (var i = 0; i < drawing.Left.Length; i++)
        {
            var colour = colours[i % colours.Count];
            right.Polyline(drawing.CurveOf(View.Left, drawing.Left[i]), new("#10181e", 2.6, Opacity: 0.45)).Polyline(drawing.CurveOf(View.Left, drawing.Left[i]), new(colour, 1.3));
            left.Ring(drawing.Left[i].U, drawing.Left[i].V, colour);
            if (!drawing.Right.IsEmpty)
            {
                left.Polyline(drawing.CurveOf(View.Right, drawing.Right[i]), new(colour, 0.9, "3 4"));
                right.Ring(drawing.Right[i].U, drawing.Right[i].V, colour);
            }

            if (numbered)
            {
                left.Label(drawing.Left[i].U, drawing.Left[i].V, $"{i + 1}", colour: colour, dx: 7, dy: -4);
                if (!drawing.Right.IsEmpty)
                {
                    right.Label(drawing.Right[i].U, drawing.Right[i].V, $"{i + 1}", colour: colour, dx: 7, dy: -4);
                }
            }
        }

        var kind = drawing.FundamentalMatrix is null
            ? "Raw pixels: a line is a curve where the lens bends it. Depth runs along it, from infinity to the camera."
            : "Lines of the given fundamental matrix in raw pixels; the lenses are not known.";
        var card = new Card("Epipolar lines over the pictures", kind).Row(left.ToSvg(), right.ToSvg());
        return drawing.Right.IsEmpty ? card : WithDistances(card, drawing);
    }

    private static Card WithDistances(Card card, EpipolarDrawing drawing)
    {
        var distances = drawing.DistancesPx;
        var most = Math.Max(0.1, 1.1 * distances.Max(Math.Abs));
        return card
            .Facts(
                ("distance from the line, RMS", Numbers.Text(drawing.RmsPx, 3, "px")),
                ("largest", Numbers.Text(distances.Max(Math.Abs), 3, "px")),
                ("mean (a tilt or bump shows here)", Numbers.Text(distances.Average(), 3, "px")))
            .Row(Histograms.Of("Distance of each match from its line", "px", "matches", [.. distances], -most, most));
    }
}
