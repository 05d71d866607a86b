using System.Globalization;
using Pairwright.Runner.Execution;

namespace Pairwright.Runner.Reports;

/// <summary>The sentences and numbers that the page, the terminal and the files share.</summary>
internal static class Wording
{
    public const string NoRequirement = "This notebook stated no requirement, so nothing was decided.";

    public const string Caution =
        "A stereo measurement is not a safety function. Depth near edges, on glare and on plain surfaces can be confidently wrong. "
        + "Machine and worker protection follows local codes and the assessment of a competent person.";

    /// <summary>One sentence on how the run came out.</summary>
    public static string Summary(NotebookRun run)
    {
        if (run.Stop is { } stop)
        {
            return stop.Sentence;
        }
        if (run.Ended is null)
        {
            var running = run.Cells.FirstOrDefault(cell => cell.State == CellState.Running);
            var place = running is null ? "no cell was running" : $"{running.Name.ToLowerInvariant()} was running";
            return $"This run has not finished: {place} when this was written.";
        }

        var all = run.Verdicts.Count;
        var met = Count(run, VerdictRecord.Met);
        var missed = Count(run, VerdictRecord.NotMet);
        var undecided = Count(run, VerdictRecord.Undecided);
        if (all == 0)
        {
            return NoRequirement;
        }
        if (met == all)
        {
            return all == 1 ? "The one requirement is met." : $"All {all} requirements are met.";
        }
        if (all == 1)
        {
            return missed == 1 ? "The one requirement is not met." : "The one requirement is undecided, which counts as not met.";
        }
        var parts = new List<string>();
        if (missed > 0)
        {
            parts.Add($"{missed} not met");
        }
        if (undecided > 0)
        {
            parts.Add($"{undecided} undecided, which counts as not met");
        }
        return $"{met} of {all} requirements {(met == 1 ? "is" : "are")} met: {string.Join(", ", parts)}.";
    }

    public static int Count(NotebookRun run, string outcome) => run.Verdicts.Count(verdict => verdict.Record.Outcome == outcome);

    /// <summary>One word for the run: <c>met</c>, <c>not met</c>, <c>no requirement</c>, <c>stopped</c> or <c>unfinished</c>.</summary>
    public static string Outcome(NotebookRun run) => run switch
    {
        { Stop: not null } => "stopped",
        { Ended: null } => "unfinished",
        { Verdicts.Count: 0 } => "no requirement",
        { ExitCode: ExitCode.AllMet } => "met",
        _ => "not met",
    };

    public static string Mark(string outcome) => outcome switch
    {
        VerdictRecord.Met => "✓",
        VerdictRecord.NotMet => "✗",
        _ => "?",
    };

    /// <summary>A value with its expanded uncertainty, to two digits of the latter, as JCGM 100:2008, 7.2.6 advises.</summary>
    public static string Measured(VerdictRecord verdict)
    {
        if (!double.IsFinite(verdict.Value))
        {
            return "not measured";
        }
        var decimals = Decimals(verdict);
        var value = Fixed(verdict.Value, decimals);
        var unit = verdict.Unit.Length == 0 ? "" : $" {verdict.Unit}";
        return double.IsFinite(verdict.ExpandedUncertainty)
            ? $"{value} ± {Fixed(verdict.ExpandedUncertainty, decimals)}{unit} (k = {verdict.CoverageFactor.ToString("0.##", CultureInfo.InvariantCulture)})"
            : $"{value}{unit} (uncertainty unknown)";
    }

    public static string Margin(VerdictRecord verdict) =>
        double.IsFinite(verdict.Margin)
            ? $"{(verdict.Margin < 0 ? "−" : "+")}{Fixed(Math.Abs(verdict.Margin), Decimals(verdict))}{(verdict.Unit.Length == 0 ? "" : $" {verdict.Unit}")}"
            : "";

    public static string Seconds(TimeSpan time) => time.TotalSeconds.ToString("0.0", CultureInfo.InvariantCulture) + " s";

    private static int Decimals(VerdictRecord verdict)
    {
        var uncertainty = verdict.ExpandedUncertainty;
        return double.IsFinite(uncertainty) && uncertainty > 0
            ? Math.Clamp(1 - (int)Math.Floor(Math.Log10(uncertainty)), 0, 9)
            : 3;
    }

    private static string Fixed(double value, int decimals) => value.ToString($"F{decimals}", CultureInfo.InvariantCulture);
}
