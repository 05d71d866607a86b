using Pairwright.Imaging;

namespace Pairwright.Notebook.Drawing;

/// <summary>The bar beside a coloured map that says which colour stands for which value, with the unit.</summary>
internal static class ScaleBar
{
    public const double Width = 66;

    /// <summary>An upright bar, the largest value on top, and the stripes that stand for no value beneath it.</summary>
    public static Svg Upright(Ramp ramp, double least, double most, string unit, double height, bool withNoValue = true)
    {
        const double bar = 16;
        const double top = 24;
        var length = height - top - (withNoValue ? 40 : 8);
        var drawing = new Svg(Width, height, $"Scale from {Numbers.Significant(least, 4)} to {Numbers.Significant(most, 4)} {unit}");
        drawing.Text(0, 13, unit, size: 11, colour: Ink.Quiet);
        drawing.Image(0, top, bar, length, Raster.From(1, 256, (_, v) => ramp.At(1 - v / 255.0)));
        drawing.Rectangle(0, top, bar, length, "none", stroke: Stroke.Frame);
        var about = Math.Max(2, (int)(length / 45));
        var step = Ticks.Step(most - least, about);
        foreach (var tick in Ticks.Within(least, most, about))
        {
            var y = top + (1 - (tick - least) / (most - least)) * length;
            drawing.Line(bar, y, bar + 4, y, new(Ink.Quiet)).Text(bar + 7, y + 3.5, Ticks.Label(tick, step), size: 10.5, colour: Ink.Quiet);
        }

        if (!withNoValue)
        {
            return drawing;
        }

        drawing.Image(0, top + length + 12, bar, bar, Raster.From(16, 16, ColourScale.NoValue));
        drawing.Rectangle(0, top + length + 12, bar, bar, "none", stroke: Stroke.Frame);
        drawing.Text(bar + 5, top + length + 24, "no value", size: 10.5, colour: Ink.Quiet);
        return drawing;
    }
}
