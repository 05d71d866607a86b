using System.Globalization;

namespace Pairwright.Notebook.Drawing;

/// <summary>Round positions along an axis, one, two or five times a power of ten apart.</summary>
internal static class Ticks
{
    /// <summary>The round step that cuts a span into about as many parts as asked.</summary>
    public static double Step(double span, int about)
    {
        var rough = span / Math.Max(about, 1);
        var power = Math.Pow(10, Math.Floor(Math.Log10(rough)));
        return (rough / power) switch { < 1.5 => 1, < 3.5 => 2, < 7.5 => 5, _ => 10 } * power;
    }

    /// <summary>All round positions within [least, most]; one position when the span is empty.</summary>
    public static IReadOnlyList<double> Within(double least, double most, int about = 5)
    {
        if (!(most > least))
        {
            return [least];
        }

        var step = Step(most - least, about);
        var first = Math.Ceiling(least / step - 1e-9);
        var count = (int)(Math.Floor(most / step + 1e-9) - first) + 1;
        return [.. Enumerable.Range(0, Math.Max(count, 0)).Select(i => (first + i) * step)];
    }

    /// <summary>The label of a position, with as many decimals as the step between positions needs.</summary>
    public static string Label(double position, double step)
    {
        if (step <= 0 || !double.IsFinite(step))
        {
            return position.ToString("G4", CultureInfo.InvariantCulture).Replace('-', '−');
        }

        var decimals = Math.Clamp((int)Math.Ceiling(-Math.Log10(step) - 1e-9), 0, 9);
        var rounded = Math.Round(position, decimals) + 0.0; // adding zero turns −0 into 0
        return rounded.ToString("F" + decimals, CultureInfo.InvariantCulture).Replace('-', '−');
    }
}
