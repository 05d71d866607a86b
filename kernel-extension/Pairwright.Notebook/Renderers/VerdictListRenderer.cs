using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Several verdicts as one table, worst first in the words above it.</summary>
internal sealed class VerdictListRenderer : Renderer<IEnumerable<Verdict>>
{
    public override string Plain(IEnumerable<Verdict> verdicts) => Lines(verdicts.Select(verdict => $"{VerdictDrawing.Word(verdict.Outcome)}  {verdict.Statement}"));

    public override Card Draw(IEnumerable<Verdict> verdicts)
    {
        var all = verdicts.ToArray();
        var counts = Enum.GetValues<VerdictOutcome>()
            .Select(outcome => (outcome, Count: all.Count(verdict => verdict.Outcome == outcome)))
            .Where(entry => entry.Count > 0)
            .Select(entry => $"{entry.Count} {VerdictDrawing.Word(entry.outcome)[2..]}");
        var rows = all.Select(verdict =>
            $"<tr><td>{Markup.Escape(verdict.Requirement.Name)}</td><td>{Markup.Escape(verdict.Requirement.Limit)}</td>"
            + $"<td class=\"pw-n\">{Markup.Escape(VerdictDrawing.Value(verdict))}</td><td>{VerdictDrawing.Interval(verdict, 200).ToMarkup()}</td>"
            + $"<td class=\"pw-n\">{Markup.Escape(VerdictDrawing.Margin(verdict))}</td>"
            + $"<td style=\"font-weight:650;white-space:nowrap;color:{VerdictDrawing.Colour(verdict.Outcome)}\">{VerdictDrawing.Word(verdict.Outcome)}</td></tr>");
        var factors = all.Select(verdict => verdict.CoverageFactor).Distinct().Select(VerdictDrawing.Factor);
        return new Card($"Requirements: {string.Join(", ", counts)}", $"Value ± expanded uncertainty (k = {string.Join(", ", factors)}) against the limits (JCGM 106); undecided counts as not met.")
            .Raw(new(
                "<table><thead><tr><th>requirement</th><th>limit</th><th class=\"pw-n\">measured</th><th></th><th class=\"pw-n\">margin</th><th>verdict</th></tr></thead><tbody>"
                + string.Concat(rows) + "</tbody></table>"));
    }
}
