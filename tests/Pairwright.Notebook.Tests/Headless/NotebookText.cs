using System.Text.Json.Nodes;
using Pairwright.Runner.Documents;

namespace Pairwright.Notebook.Tests.Headless;

/// <summary>Writes tiny notebooks for the tests.</summary>
internal static class NotebookText
{
    public static JsonObject Code(string source, params string[] tags) => new()
    {
        ["cell_type"] = "code",
        ["metadata"] = tags.Length == 0 ? new JsonObject() : new JsonObject { ["tags"] = new JsonArray([.. tags.Select(tag => (JsonNode)tag)]) },
        ["source"] = source,
        ["outputs"] = new JsonArray(),
        ["execution_count"] = null,
    };

    public static JsonObject Parameters(string source) => Code(source, NotebookCell.ParametersTag);

    public static JsonObject Markdown(string source) => new()
    {
        ["cell_type"] = "markdown",
        ["metadata"] = new JsonObject(),
        ["source"] = source,
    };

    public static JsonObject Raw(string source) => new()
    {
        ["cell_type"] = "raw",
        ["metadata"] = new JsonObject(),
        ["source"] = source,
    };

    /// <summary>Code that makes one verdict.</summary>
    public static string Verdict(string outcome, string requirement = "cup of the plank") =>
        $"""
        VerdictLedger.Record(new VerdictRecord("{requirement}", "{outcome}", 1.2345, 0.134, 2, "at most 1.5 mm", 0.2655, "mm", "The {requirement} is 1.23 mm.", DateTimeOffset.Now));
        """;

    public static JsonObject Of(params JsonObject[] cells) => new()
    {
        ["nbformat"] = 4,
        ["nbformat_minor"] = 2,
        ["metadata"] = new JsonObject
        {
            ["kernelspec"] = new JsonObject { ["name"] = ".net-csharp", ["language"] = "C#", ["display_name"] = ".NET (C#)" },
        },
        ["cells"] = new JsonArray([.. cells]),
    };
}
