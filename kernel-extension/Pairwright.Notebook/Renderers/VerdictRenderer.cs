using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>One requirement held against one measured value.</summary>
internal sealed class VerdictRenderer : Renderer<Verdict>
{
    public override string Plain(Verdict verdict) => $"{VerdictDrawing.Word(verdict.Outcome)}  {verdict.Statement}";

    public override Card Draw(Verdict verdict)
    {
        var colour = VerdictDrawing.Colour(verdict.Outcome);
        return new Card(verdict.Requirement.Name, $"{verdict.Requirement.Limit}, decided with k = {VerdictDrawing.Factor(verdict.CoverageFactor)} (JCGM 106); undecided counts as not met")
            .Raw(new($"<p style=\"font-size:17px;font-weight:650;color:{colour};margin:4px 0\">{VerdictDrawing.Word(verdict.Outcome)}</p>"))
            .Row(VerdictDrawing.Interval(verdict))
            .Facts(
                ($"measured ± expanded uncertainty (k = {VerdictDrawing.Factor(verdict.CoverageFactor)})", VerdictDrawing.Value(verdict)),
                ("limit", verdict.Requirement.Limit),
                ("margin", VerdictDrawing.Margin(verdict)),
                ("standard uncertainty: random, common", $"{Numbers.Significant(verdict.Measured.RandomSigma, 2, verdict.Measured.Unit)}, {Numbers.Significant(verdict.Measured.CommonSigma, 2, verdict.Measured.Unit)}"),
                ("probability inside the limits", VerdictDrawing.Probability(verdict)))
            .Caption(verdict.Statement);
    }
}
