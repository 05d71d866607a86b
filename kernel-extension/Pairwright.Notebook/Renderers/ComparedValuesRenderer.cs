using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Measured values beside known ones: a table, and a line of differences in units of the expanded uncertainty.</summary>
internal sealed class ComparedValuesRenderer : Renderer<ComparedValues>
{
    private const double RowHeight = 24;

    public override string Plain(ComparedValues compared) => Lines(
    [
        $"{compared.Title}: {Summary(compared)}",
        .. compared.Entries.Select(entry =>
            $"{entry.Name}: {Numbers.WithExpanded(entry.Measured.Value, entry.Measured.Expanded(), entry.Measured.Unit)} (k = 2), {compared.KnownName} {Known(entry)}, {Word(entry)}"),
    ]);

    public override Card Draw(ComparedValues compared)
    {
        var card = new Card(compared.Title, Summary(compared)).Table(
            ["", "measured ± U (k = 2)", "random, 1 σ", "common, 1 σ", compared.KnownName, "difference", $"{compared.KnownName} value within U"],
            compared.Entries.Select(entry => new[]
            {
                entry.Name,
                Numbers.WithExpanded(entry.Measured.Value, entry.Measured.Expanded(), entry.Measured.Unit),
                Numbers.Significant(entry.Measured.RandomSigma, 2, entry.Measured.Unit),
                Numbers.Significant(entry.Measured.CommonSigma, 2, entry.Measured.Unit),
                Known(entry),
                Numbers.Like(entry.Measured.Value - entry.Known, entry.Measured.Expanded(), entry.Measured.Unit),
                Word(entry),
            }));
        return compared.Entries.IsEmpty ? card : card.Row(Differences(compared));
    }

    private static string Summary(ComparedValues compared)
    {
        var rms = double.IsNaN(compared.RmsDifference) ? "" : $"; differences {Numbers.Significant(compared.RmsDifference, 2, compared.Entries[0].Measured.Unit)} RMS";
        return $"{compared.Covered} of {compared.Entries.Length} {compared.KnownName} values lie within the expanded uncertainty (k = 2){rms}";
    }

    private static string Known((string Name, Measurement.MeasuredValue Measured, double Known) entry) =>
        Numbers.Like(entry.Known, entry.Measured.Expanded(), entry.Measured.Unit);

    private static string Word((string Name, Measurement.MeasuredValue Measured, double Known) entry) =>
        ComparedValues.Covers(entry.Measured, entry.Known) ? "✓ yes" : "✗ no";

    // All on one scale, whatever the units: the difference over the expanded uncertainty, which covers between −1 and 1.
    private static Svg Differences(ComparedValues compared)
    {
        const double width = 560;
        const double names = 170;
        var ratios = compared.Entries.Select(entry => (entry.Measured.Value - entry.Known) / entry.Measured.Expanded()).ToArray();
        var reach = Math.Clamp(1.15 * ratios.Where(double.IsFinite).Select(Math.Abs).Append(1.2).Max(), 1.4, 6);
        var bottom = RowHeight * ratios.Length + 8;
        var drawing = new Svg(width, bottom + 40, $"{compared.Title}: measured minus {compared.KnownName} over the expanded uncertainty");
        double At(double ratio) => names + (Math.Clamp(ratio, -reach, reach) + reach) / (2 * reach) * (width - names - 16);

        drawing.Rectangle(At(-1), 4, At(1) - At(-1), bottom - 4, Ink.Met, 0.13);
        drawing.Line(At(0), 4, At(0), bottom, Stroke.Frame);
        drawing.Line(At(-reach), bottom, At(reach), bottom, Stroke.Frame);
        foreach (var tick in Ticks.Within(-reach, reach, 4))
        {
            drawing.Text(At(tick), bottom + 15, Numbers.Significant(tick, 2), Anchor.Middle, colour: Ink.Quiet);
        }

        for (var i = 0; i < ratios.Length; i++)
        {
            var y = 4 + RowHeight * (i + 0.5);
            drawing.Text(names - 10, y + 4, compared.Entries[i].Name, Anchor.End, colour: Ink.Text);
            if (double.IsFinite(ratios[i]))
            {
                drawing.Circle(At(ratios[i]), y, 4.5, Math.Abs(ratios[i]) <= 1 ? Ink.Met : Ink.NotMet);
            }
        }

        drawing.Text(At(0), bottom + 33, $"(measured − {compared.KnownName}) / U; shaded: covered", Anchor.Middle, colour: Ink.Quiet);
        return drawing;
    }
}
