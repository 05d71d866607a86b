using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Several values as one table.</summary>
internal sealed class MeasuredValueListRenderer : Renderer<IEnumerable<MeasuredValue>>
{
    public override string Plain(IEnumerable<MeasuredValue> values) => Lines(values.Select(value => value.ToString()));

    public override Card Draw(IEnumerable<MeasuredValue> values) => new Card("Measured values", "± is one standard uncertainty, random and common part together")
        .Table(
            ["no.", "value", "random", "common"],
            values.Index().Select(entry => new[]
            {
                $"{entry.Index + 1}",
                Numbers.WithSigma(entry.Item.Value, entry.Item.StandardUncertainty, entry.Item.Unit),
                Numbers.Significant(entry.Item.RandomSigma, 2, entry.Item.Unit),
                Numbers.Significant(entry.Item.CommonSigma, 2, entry.Item.Unit),
            }));
}
