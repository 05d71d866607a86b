using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A value with both parts of its uncertainty.</summary>
internal sealed class MeasuredValueRenderer : Renderer<MeasuredValue>
{
    public override string Plain(MeasuredValue value) => value.ToString();

    public override Card Draw(MeasuredValue value) => new Card($"{Numbers.WithSigma(value.Value, value.StandardUncertainty, value.Unit)}", "measured value ± one standard uncertainty")
        .Facts(
            ("random part (noise, matching)", Numbers.Significant(value.RandomSigma, 2, value.Unit)),
            ("common part (the rig; averages over no number of pixels)", Numbers.Significant(value.CommonSigma, 2, value.Unit)),
            ("expanded, k = 2", Numbers.WithExpanded(value.Value, value.Expanded(2), value.Unit)));
}
