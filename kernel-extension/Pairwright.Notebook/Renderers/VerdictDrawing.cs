using System.Globalization;
using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A verdict in words, in one line of numbers, and as the value's interval against its limits.</summary>
internal static class VerdictDrawing
{
    /// <summary>The outcome with a sign of its own, so that colour is never needed to tell it.</summary>
    public static string Word(VerdictOutcome outcome) => outcome switch
    {
        VerdictOutcome.Met => "✓ met",
        VerdictOutcome.NotMet => "✗ not met",
        _ => "? undecided",
    };

    public static string Colour(VerdictOutcome outcome) => outcome switch
    {
        VerdictOutcome.Met => Ink.Met,
        VerdictOutcome.NotMet => Ink.NotMet,
        _ => Ink.Undecided,
    };

    /// <summary>A coverage factor, without idle zeros.</summary>
    public static string Factor(double k) => k.ToString("0.###", CultureInfo.InvariantCulture);

    /// <summary>The probability that the quantity is inside the limits; never a certainty.</summary>
    public static string Probability(Verdict verdict) => verdict.ConformanceProbability switch
    {
        > 0.999 => "above 99.9 %",
        < 0.001 => "below 0.1 %",
        var share => Numbers.Percent(share),
    };

    /// <summary>Value ± expanded uncertainty.</summary>
    public static string Value(Verdict verdict) => Numbers.WithExpanded(verdict.Measured.Value, verdict.ExpandedUncertainty, verdict.Measured.Unit);

    public static string Margin(Verdict verdict) => double.IsNaN(verdict.Margin)
        ? Numbers.NoValue
        : Numbers.Like(Math.Abs(verdict.Margin), verdict.ExpandedUncertainty, verdict.Measured.Unit) + (verdict.Margin >= 0 ? " inside" : " outside");

    /// <summary>A line with the tolerated range shaded, the limits marked, and the value with its expanded uncertainty over it.</summary>
    public static Svg Interval(Verdict verdict, double width = 360)
    {
        const double height = 54;
        const double middle = 20;
        var (value, reach) = (verdict.Measured.Value, double.IsNaN(verdict.ExpandedUncertainty) ? 0 : verdict.ExpandedUncertainty);
        var limits = new[] { verdict.Requirement.Lower, verdict.Requirement.Upper }.Where(double.IsFinite).ToArray();
        var drawing = new Svg(width, height, verdict.Statement);
        var axis = Axis.Over("", [.. limits, value - reach, value + reach, .. limits.Length == 1 && limits[0] > 0 ? [0.0] : Array.Empty<double>()], room: 0.12);
        double At(double x) => 8 + axis.Share(x) * (width - 40);

        var (from, to) = (Math.Max(verdict.Requirement.Lower, axis.Least), Math.Min(verdict.Requirement.Upper, axis.Most));
        drawing.Rectangle(At(from), middle - 12, At(to) - At(from), 24, Ink.Met, 0.13);
        drawing.Line(8, middle + 12, width - 32, middle + 12, Stroke.Frame);
        var about = (int)(width / 70);
        var step = Ticks.Step(axis.Most - axis.Least, about);
        foreach (var tick in Ticks.Within(axis.Least, axis.Most, about))
        {
            drawing.Line(At(tick), middle + 12, At(tick), middle + 16, Stroke.Frame);
            drawing.Text(At(tick), middle + 28, Ticks.Label(tick, step), Anchor.Middle, 10, Ink.Quiet);
        }

        foreach (var limit in limits)
        {
            drawing.Line(At(limit), middle - 14, At(limit), middle + 12, new(Ink.Text, 2));
        }

        var colour = Colour(verdict.Outcome);
        drawing.Line(At(value - reach), middle, At(value + reach), middle, new(colour, 2.5));
        foreach (var end in reach > 0 ? new[] { value - reach, value + reach } : [])
        {
            drawing.Line(At(end), middle - 5, At(end), middle + 5, new(colour, 2));
        }

        return drawing.Circle(At(value), middle, 4.5, colour).Text(width, middle + 28, verdict.Measured.Unit, Anchor.End, 10, Ink.Quiet);
    }
}
