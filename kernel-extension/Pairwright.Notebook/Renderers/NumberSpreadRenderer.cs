using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A histogram with mean, root mean square and extremes.</summary>
internal sealed class NumberSpreadRenderer : Renderer<NumberSpread>
{
    public override string Plain(NumberSpread spread) =>
        $"{spread.Title}: {spread.Values.Length} values, mean {Number(spread.Mean, spread)}, RMS {Number(spread.Rms, spread)}, from {Number(spread.Least, spread)} to {Number(spread.Most, spread)}"
        + (spread.Missing > 0 ? $", {spread.Missing} missing" : "");

    public override Card Draw(NumberSpread spread)
    {
        var card = new Card(spread.Title).Facts(
            ("values", spread.Missing > 0 ? $"{spread.Values.Length}, {spread.Missing} of them missing" : $"{spread.Values.Length}"),
            ("mean", Number(spread.Mean, spread)),
            ("root mean square", Number(spread.Rms, spread)),
            ("from, to", $"{Number(spread.Least, spread)}, {Number(spread.Most, spread)}"));
        if (double.IsNaN(spread.Mean))
        {
            return card;
        }

        var axis = Axis.Over(spread.Unit, spread.Values);
        return card.Row(Histograms.Of(spread.Title, spread.Unit, "values", spread.Values, axis.Least, axis.Most, 40, 560));
    }

    private static string Number(double value, NumberSpread spread) => Numbers.Significant(value, 3, spread.Unit);
}
