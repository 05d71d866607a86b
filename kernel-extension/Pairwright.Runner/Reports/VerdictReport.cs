using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using Pairwright.Runner.Execution;

namespace Pairwright.Runner.Reports;

/// <summary>The verdicts and where they came from, as JSON for a build server or an archive.</summary>
internal static class VerdictReport
{
    /// <summary>Raised when a reader of an earlier version would misread the file.</summary>
    public const int SchemaVersion = 1;

    private static readonly JsonSerializerOptions Written = new() { WriteIndented = true, Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    public static string Render(NotebookRun run)
    {
        var parameters = new JsonObject();
        foreach (var (name, value) in run.Parameters)
        {
            parameters[name] = value;
        }

        return new JsonObject
        {
            ["schema"] = "pairwright verdicts",
            ["schemaVersion"] = SchemaVersion,
            ["outcome"] = Wording.Outcome(run),
            ["exitCode"] = run.ExitCode,
            ["summary"] = Wording.Summary(run),
            ["verdicts"] = new JsonArray([.. run.Verdicts.Select(Verdict)]),
            ["stop"] = run.Stop is { } stop ? new JsonObject { ["cell"] = stop.Cell?.Number, ["sentence"] = stop.Sentence } : null,
            ["provenance"] = new JsonObject
            {
                ["notebook"] = Path.GetFileName(run.Document.Path),
                ["notebookSha256"] = run.Document.Sha256,
                ["parameters"] = parameters,
                ["tool"] = "pairwright",
                ["toolVersion"] = Provenance.Version,
                ["started"] = run.Started.ToString("O"),
                ["ended"] = run.Ended?.ToString("O"),
            },
        }.ToJsonString(Written) + "\n";
    }

    private static JsonNode Verdict(RunVerdict verdict) => new JsonObject
    {
        ["requirement"] = verdict.Record.Requirement,
        ["outcome"] = verdict.Record.Outcome,
        ["value"] = Number(verdict.Record.Value),
        ["expandedUncertainty"] = Number(verdict.Record.ExpandedUncertainty),
        ["coverageFactor"] = Number(verdict.Record.CoverageFactor),
        ["limit"] = verdict.Record.Limit,
        ["margin"] = Number(verdict.Record.Margin),
        ["unit"] = verdict.Record.Unit,
        ["statement"] = verdict.Record.Statement,
        ["cell"] = verdict.Cell?.Number,
        ["at"] = verdict.Record.At.ToString("O"),
    };

    /// <summary>JSON has no NaN; what is not known is null.</summary>
    private static JsonNode? Number(double value) => double.IsFinite(value) ? value : null;
}
