using System.Globalization;
using System.Xml;
using System.Xml.Linq;
using Pairwright.Runner.Execution;

namespace Pairwright.Runner.Reports;

/// <summary>The run as build servers read it: one test case for each verdict.</summary>
/// <remarks>
/// Not met and undecided are failures; a failed cell or an early end is an error; a run that stated no requirement is one
/// skipped case, so that it cannot pass for a good one.
/// </remarks>
internal static class JunitReport
{
    public static string Render(NotebookRun run)
    {
        var cases = run.Verdicts.Select(verdict => Case(run, verdict)).ToList();
        if (run.Stop is { } stop)
        {
            cases.Add(Case(run, stop.Cell?.Name ?? "run", new XElement("error", Text("message", stop.Sentence), new XAttribute("type", "stopped"))));
        }
        else if (run.Ended is null)
        {
            cases.Add(Case(run, "run", new XElement("error", Text("message", Wording.Summary(run)), new XAttribute("type", "unfinished"))));
        }
        else if (cases.Count == 0)
        {
            cases.Add(Case(run, "requirements", new XElement("skipped", Text("message", Wording.NoRequirement))));
        }

        var suite = new XElement(
            "testsuite",
            Text("name", run.Name),
            new XAttribute("tests", cases.Count),
            new XAttribute("failures", cases.Count(test => test.Element("failure") is not null)),
            new XAttribute("errors", cases.Count(test => test.Element("error") is not null)),
            new XAttribute("skipped", cases.Count(test => test.Element("skipped") is not null)),
            new XAttribute("time", ((run.Ended ?? DateTimeOffset.Now) - run.Started).TotalSeconds.ToString("0.000", CultureInfo.InvariantCulture)),
            new XAttribute("timestamp", run.Started.UtcDateTime.ToString("yyyy-MM-ddTHH:mm:ss", CultureInfo.InvariantCulture)),
            new XElement(
                "properties",
                Property("notebook", Path.GetFileName(run.Document.Path)),
                Property("notebook sha256", run.Document.Sha256),
                Property("pairwright version", Provenance.Version),
                run.Parameters.Select(parameter => Property($"parameter {parameter.Key}", parameter.Value))),
            cases);
        return new XDeclaration("1.0", "utf-8", null) + "\n" + new XElement("testsuites", suite) + "\n";
    }

    private static XElement Case(NotebookRun run, RunVerdict verdict)
    {
        var record = verdict.Record;
        var detail = $"measured {Wording.Measured(record)}, limit {record.Limit}, margin {Wording.Margin(record)}";
        return record.Outcome == VerdictRecord.Met
            ? Case(run, record.Requirement, new XElement("system-out", Clean(detail)))
            : Case(run, record.Requirement, new XElement("failure", Text("message", record.Statement), Text("type", record.Outcome), Clean(detail)));
    }

    private static XElement Case(NotebookRun run, string name, XElement content) =>
        new("testcase", Text("classname", run.Name), Text("name", name), new XAttribute("time", "0"), content);

    private static XElement Property(string name, string value) => new("property", Text("name", name), Text("value", value));

    private static XAttribute Text(string name, string value) => new(name, Clean(value));

    /// <summary>XML 1.0 cannot hold most control characters, escaped or not.</summary>
    private static string Clean(string text) =>
        string.Concat(text.EnumerateRunes().Where(rune => rune.Value > 0xFFFF || XmlConvert.IsXmlChar((char)rune.Value)));
}
