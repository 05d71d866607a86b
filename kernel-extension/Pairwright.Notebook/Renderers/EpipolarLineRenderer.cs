using Pairwright.Geometry;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A line's equation, its slope, and, where the picture's size is known, its ends and its course.</summary>
internal sealed class EpipolarLineRenderer : Renderer<EpipolarLine>
{
    public override string Plain(EpipolarLine line) => Lines(
        $"Epipolar line {Equation(line)} in the {Name(line)} view, ideal pixels",
        Ends(line) is { } ends ? $"{ends} on the picture of {line.Size} px" : null);

    public override Card Draw(EpipolarLine line)
    {
        var card = new Card($"Epipolar line in the {Name(line)} view", "Ideal pixels; the left side of the equation is the signed distance of a pixel from the line, in pixels.");
        var (u, v) = line.Direction;
        card.Facts(
            ("equation", Equation(line)),
            ("angle against the rows", Numbers.Text(Math.Atan2(v, u) * 180 / Math.PI, 3) + "°"),
            ("on the picture", line.Size is null ? "the picture's size is not known" : Ends(line) ?? "the line misses the picture"));
        if (line.Size is { } size && line.ClippedTo(size) is var (from, to))
        {
            card.Row(new PictureCanvas($"The line in the {Name(line)} view", size, null, 260)
                .Line(from.U, from.V, to.U, to.V, new(line.View == View.Left ? Ink.Left : Ink.Right, 2))
                .ToSvg());
        }

        return card;
    }

    private static string Name(EpipolarLine line) => line.View == View.Left ? "left" : "right";

    private static string Equation(EpipolarLine line) =>
        $"{Numbers.Fixed(line.A, 6)}·u {Signed(line.B, 6)}·v {Signed(line.C, 3)} = 0";

    private static string Signed(double value, int decimals) => (value < 0 ? "− " : "+ ") + Numbers.Fixed(Math.Abs(value), decimals);

    private static string? Ends(EpipolarLine line) => line.Size is { } size && line.ClippedTo(size) is var (from, to)
        ? $"from ({Numbers.Fixed(from.U, 1)}, {Numbers.Fixed(from.V, 1)}) to ({Numbers.Fixed(to.U, 1)}, {Numbers.Fixed(to.V, 1)}) px"
        : null;
}
