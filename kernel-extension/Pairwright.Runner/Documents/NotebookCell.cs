using System.Text.Json.Nodes;

namespace Pairwright.Runner.Documents;

/// <summary>One cell of a notebook: a view on its JSON, which stays as it was read except for what is set here.</summary>
internal sealed class NotebookCell(JsonObject json)
{
    public const string ParametersTag = "parameters";
    public const string InjectedTag = "injected-parameters";

    public JsonObject Json { get; } = json;

    public string Kind => Json["cell_type"]?.GetValue<string>() ?? "";

    public bool IsCode => Kind == "code";

    public bool IsMarkdown => Kind == "markdown";

    /// <summary>The text, which nbformat stores as one string or as a list of lines.</summary>
    public string Source => TextOf(Json["source"]);

    public IEnumerable<string> Tags =>
        Json["metadata"]?["tags"] is JsonArray tags ? tags.Select(TextOf) : [];

    public bool IsInjected => Tags.Contains(InjectedTag);

    /// <summary>The language this cell asks for, or null when it takes the notebook's own.</summary>
    /// <remarks>Two metadata keys are in use in the wild for the same thing, an older and a newer one.</remarks>
    public string? Language
    {
        get
        {
            var metadata = Json["metadata"];
            return TextOrNull(metadata?["polyglot_notebook"]?["kernelName"])
                ?? TextOrNull(metadata?["dotnet_interactive"]?["language"])
                ?? TextOrNull(metadata?["vscode"]?["languageId"]);
        }
    }

    public JsonArray Outputs
    {
        get
        {
            if (Json["outputs"] is JsonArray outputs)
            {
                return outputs;
            }
            var fresh = new JsonArray();
            Json["outputs"] = fresh;
            return fresh;
        }
    }

    public void ClearOutputs()
    {
        Json["outputs"] = new JsonArray();
        Json["execution_count"] = null;
    }

    public static NotebookCell Code(string source, string tag) => new(new JsonObject
    {
        ["cell_type"] = "code",
        ["execution_count"] = null,
        ["metadata"] = new JsonObject { ["tags"] = new JsonArray(tag) },
        ["outputs"] = new JsonArray(),
        ["source"] = source,
    });

    /// <summary>A text that nbformat may store as one string or as a list of lines.</summary>
    public static string TextOf(JsonNode? node) => node switch
    {
        null => "",
        JsonArray lines => string.Concat(lines.Select(TextOf)),
        JsonValue value when value.TryGetValue<string>(out var text) => text,
        _ => node.ToJsonString(),
    };

    private static string? TextOrNull(JsonNode? node) =>
        node is JsonValue value && value.TryGetValue<string>(out var text) ? text : null;
}
