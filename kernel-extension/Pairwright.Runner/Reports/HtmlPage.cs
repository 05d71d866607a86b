using System.Globalization;
using System.Net;
using System.Text;
using System.Text.Json.Nodes;
using System.Text.RegularExpressions;
using Pairwright.Runner.Documents;
using Pairwright.Runner.Execution;

namespace Pairwright.Runner.Reports;

/// <summary>The run as one page that needs nothing but a browser.</summary>
/// <remarks>
/// The page forbids itself every connection (its content security policy), so that it shows the same on the machine that
/// made it, in an archive, and in a plant without a network.
/// </remarks>
internal static partial class HtmlPage
{
    private const string Policy =
        "default-src 'none'; script-src 'unsafe-inline' 'unsafe-eval' blob: data:; style-src 'unsafe-inline'; "
        + "img-src data: blob:; font-src data:; media-src data: blob:; connect-src data: blob:; worker-src blob: data:";

    /// <summary>What is shown of a value that comes in several forms: the first of these that is there.</summary>
    private static readonly string[] Preferred =
        ["text/html", "image/svg+xml", "image/png", "image/jpeg", "text/markdown", "text/plain", "application/json"];

    private static readonly Lazy<string> Style = new(ReadStyle);

    public static string Render(NotebookRun run)
    {
        var page = new StringBuilder();
        page.Append("<!doctype html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n")
            .Append($"<meta http-equiv=\"Content-Security-Policy\" content=\"{Policy}\">\n")
            .Append("<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n")
            .Append($"<title>{Escape(run.Document.Title)}</title>\n<style>\n{Style.Value}</style>\n</head>\n<body>\n");
        Head(page, run);
        page.Append("<main>\n");
        Cells(page, run);
        page.Append("</main>\n");
        Foot(page, run);
        return page.Append("</body>\n</html>\n").ToString();
    }

    private static void Head(StringBuilder page, NotebookRun run)
    {
        page.Append("<header>\n")
            .Append($"<h1>{Escape(run.Document.Title)}</h1>\n")
            .Append($"<p class=\"run\">{Escape(Path.GetFileName(run.Document.Path))}, run on {Time(run.Started)}</p>\n");
        var kind = Wording.Outcome(run).Replace(' ', '-');
        page.Append($"<section class=\"summary {kind}\" id=\"summary\">\n<p class=\"sentence\">{Escape(Wording.Summary(run))}</p>\n");
        if (run.Stop is { } stop)
        {
            var place = stop.Cell is { } cell ? $"The run stopped at <a href=\"#{Anchor(cell)}\">{Escape(cell.Name.ToLowerInvariant())}</a>. " : "";
            page.Append($"<p>{place}No later cell was run; what came before it is kept below.</p>\n");
        }
        if (run.Verdicts.Count > 0)
        {
            Verdicts(page, run);
        }
        page.Append("</section>\n");
        if (run.Parameters.Count > 0)
        {
            page.Append("<p class=\"run\">Set for this run: ")
                .AppendJoin(", ", run.Parameters.Select(parameter => $"<code>{Escape(parameter.Key)} = {Escape(parameter.Value)}</code>"))
                .Append("</p>\n");
        }
        page.Append("</header>\n");
    }

    private static void Verdicts(StringBuilder page, NotebookRun run)
    {
        page.Append("<ul class=\"counts\">");
        foreach (var outcome in (string[])[VerdictRecord.Met, VerdictRecord.NotMet, VerdictRecord.Undecided])
        {
            page.Append($"<li class=\"{outcome.Replace(' ', '-')}\"><b>{Wording.Count(run, outcome)}</b> {outcome}</li>");
        }
        page.Append("</ul>\n<div class=\"wide\"><table class=\"verdicts\">\n<thead><tr><th>requirement</th><th>limit</th><th>measured</th><th>margin</th><th>verdict</th></tr></thead>\n<tbody>\n");
        foreach (var verdict in run.Verdicts)
        {
            var record = verdict.Record;
            var name = verdict.Cell is { } cell ? $"<a href=\"#{Anchor(cell)}\">{Escape(record.Requirement)}</a>" : Escape(record.Requirement);
            page.Append($"<tr class=\"{record.Outcome.Replace(' ', '-')}\" title=\"{Escape(record.Statement)}\"><td>{name}</td><td>{Escape(record.Limit)}</td>")
                .Append($"<td>{Escape(Wording.Measured(record))}</td><td>{Escape(Wording.Margin(record))}</td>")
                .Append($"<td class=\"outcome\">{Wording.Mark(record.Outcome)} {Escape(record.Outcome)}</td></tr>\n");
        }
        page.Append("</tbody>\n</table></div>\n");
    }

    private static void Cells(StringBuilder page, NotebookRun run)
    {
        var folder = Path.GetDirectoryName(run.Document.Path)!;
        var runs = run.Cells.ToDictionary(cell => cell.Cell);
        var titleShown = false;
        foreach (var cell in run.Document.Cells)
        {
            if (cell.IsMarkdown)
            {
                var text = cell.Source;
                if (!titleShown && NotebookDocument.FirstHeading(cell) == run.Document.Title)
                {
                    // The page's own heading says it already.
                    titleShown = true;
                    text = WithoutFirstHeading(text);
                }
                page.Append($"<section class=\"text\">\n{MarkdownText.ToHtml(text, cell, folder)}</section>\n");
            }
            else if (runs.TryGetValue(cell, out var executed))
            {
                Code(page, executed, folder);
            }
            else
            {
                page.Append($"<pre class=\"raw\">{Escape(cell.Source)}</pre>\n");
            }
        }
    }

    private static void Code(StringBuilder page, CellRun run, string folder)
    {
        var state = run.State switch
        {
            CellState.NotRun => "not run",
            CellState.Running => "running",
            CellState.Failed => $"failed after {Wording.Seconds(run.Elapsed)}",
            _ => Wording.Seconds(run.Elapsed),
        };
        var failed = run.State == CellState.Failed;
        var first = run.Cell.Source.Split('\n').Select(line => line.Trim()).FirstOrDefault(line => line.Length > 0) ?? "";
        page.Append($"<section class=\"cell{(failed ? " failed" : "")}{(run.State == CellState.NotRun ? " idle" : "")}\" id=\"{Anchor(run)}\">\n")
            .Append($"<details class=\"code\"{(failed ? " open" : "")}><summary><span class=\"number\">{Escape(run.Label)}</span>")
            .Append($"<code>{Escape(Shorten(first))}</code><span class=\"time\">{state}</span></summary>")
            .Append($"<pre><code>{Escape(run.Cell.Source)}</code></pre></details>\n<div class=\"outputs\">\n");
        foreach (var output in run.Cell.Outputs.OfType<JsonObject>())
        {
            Output(page, output, run.Cell, folder);
        }
        page.Append("</div>\n</section>\n");
    }

    private static void Output(StringBuilder page, JsonObject output, NotebookCell cell, string folder)
    {
        switch (NotebookCell.TextOf(output["output_type"]))
        {
            case "stream":
                page.Append($"<pre class=\"{Escape(NotebookCell.TextOf(output["name"]))}\">{Escape(Plain(NotebookCell.TextOf(output["text"])))}</pre>\n");
                break;
            case "error":
                var trace = output["traceback"] is JsonArray lines ? string.Join('\n', lines.Select(NotebookCell.TextOf)) : NotebookCell.TextOf(output["evalue"]);
                page.Append($"<pre class=\"error\">{Escape(Plain(trace))}</pre>\n");
                break;
            default:
                if (output["data"] is JsonObject data)
                {
                    Value(page, data, cell, folder);
                }
                break;
        }
    }

    private static void Value(StringBuilder page, JsonObject data, NotebookCell cell, string folder)
    {
        var type = Preferred.FirstOrDefault(data.ContainsKey);
        if (type is null)
        {
            return;
        }
        var value = NotebookCell.TextOf(data[type]);
        page.Append("<div class=\"value\">");
        page.Append(type switch
        {
            "text/html" or "image/svg+xml" => value,
            "image/png" or "image/jpeg" => $"<img src=\"data:{type};base64,{Escape(value.ReplaceLineEndings(""))}\" alt=\"{Escape(NotebookCell.TextOf(data["text/plain"]))}\">",
            "text/markdown" => MarkdownText.ToHtml(value, cell, folder),
            _ => $"<pre>{Escape(Plain(value))}</pre>",
        });
        page.Append("</div>\n");
    }

    private static void Foot(StringBuilder page, NotebookRun run)
    {
        page.Append("<footer>\n<table class=\"provenance\">\n");
        Row("notebook", Path.GetFileName(run.Document.Path));
        Row("its SHA-256", run.Document.Sha256);
        Row("started", Time(run.Started));
        Row("ended", run.Ended is { } ended ? $"{Time(ended)} ({Wording.Seconds(ended - run.Started)})" : "not yet");
        Row("made by", $"pairwright {Provenance.Version}");
        page.Append("</table>\n")
            .Append($"<p class=\"caution\">{Escape(Wording.Caution)}</p>\n</footer>\n");

        void Row(string name, string value) => page.Append($"<tr><th>{Escape(name)}</th><td>{Escape(value)}</td></tr>\n");
    }

    private static string WithoutFirstHeading(string text)
    {
        var lines = text.Split('\n').ToList();
        var at = lines.FindIndex(line => line.TrimStart().StartsWith('#'));
        if (at >= 0)
        {
            lines.RemoveAt(at);
        }
        return string.Join('\n', lines);
    }

    private static string Anchor(CellRun run) => $"cell-{run.Label}";

    private static string Shorten(string line) => line.Length <= 110 ? line : line[..109] + "…";

    private static string Time(DateTimeOffset time) => time.ToString("yyyy-MM-dd HH:mm:ss zzz", CultureInfo.InvariantCulture);

    private static string Escape(string text) => WebUtility.HtmlEncode(text);

    private static string Plain(string text) => TerminalCodes().Replace(text, "");

    private static string ReadStyle()
    {
        using var stream = typeof(HtmlPage).Assembly.GetManifestResourceStream("page.css")
            ?? throw new InvalidOperationException("The page's style sheet is missing from the program.");
        using var reader = new StreamReader(stream);
        return reader.ReadToEnd();
    }

    [GeneratedRegex(@"\x1B\[[0-9;?]*[A-Za-z]")]
    private static partial Regex TerminalCodes();
}
