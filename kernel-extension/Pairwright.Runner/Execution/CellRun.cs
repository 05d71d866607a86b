using System.Diagnostics;
using System.Text.Json;
using System.Text.Json.Nodes;
using Pairwright.Runner.Documents;

namespace Pairwright.Runner.Execution;

/// <summary>One code cell's run: its state, time and outputs, which it keeps in the notebook's own format.</summary>
internal sealed class CellRun(NotebookCell cell, int? number, string caption)
{
    /// <summary>A cell that prints without end must not fill the report: what comes after this many characters is left out.</summary>
    private const int MostText = 1_000_000;

    /// <summary>The same for everything that a cell shows.</summary>
    private const long MostShown = 200_000_000;

    private readonly Stopwatch _clock = new();
    private readonly Dictionary<string, JsonObject> _shown = new(StringComparer.Ordinal);
    private long _text;
    private long _size;

    public NotebookCell Cell { get; } = cell;

    /// <summary>The cell's number among the code cells of the notebook, from 1; null for the injected one, so that numbers do not depend on <c>--set</c>.</summary>
    public int? Number { get; } = number;

    /// <summary>How errors name it: <c>cell[3]</c> or <c>cell[set]</c>.</summary>
    public string Label { get; } = number?.ToString() ?? "set";

    /// <summary>How a sentence names it.</summary>
    public string Name { get; } = number is { } n ? $"Cell {n}" : "The cell of --set values";

    /// <summary>What the terminal shows of it: the heading before it, or its first line.</summary>
    public string Caption { get; } = caption;

    public CellState State { get; private set; }

    public TimeSpan Elapsed => _clock.Elapsed;

    public void Start()
    {
        State = CellState.Running;
        _clock.Start();
    }

    public void Finish()
    {
        State = CellState.Done;
        _clock.Stop();
        Cell.Json["execution_count"] = Number;
    }

    public void Fail()
    {
        State = CellState.Failed;
        _clock.Stop();
        Cell.Json["execution_count"] = Number;
    }

    public void AddError(string name, string message, IEnumerable<string> trace) =>
        Cell.Outputs.Add(new JsonObject
        {
            ["output_type"] = "error",
            ["ename"] = name,
            ["evalue"] = message,
            ["traceback"] = new JsonArray([.. trace.Select(line => (JsonNode)line)]),
        });

    public void AddText(string stream, string text)
    {
        if (_text > MostText || text.Length == 0)
        {
            return;
        }
        _text += text.Length;
        if (_text > MostText)
        {
            text = text[..^(int)Math.Min(text.Length, _text - MostText)] + "\n… the rest of this cell's text is left out.\n";
        }

        if (Cell.Outputs is [.., JsonObject last] && last["output_type"]?.GetValue<string>() == "stream" && last["name"]?.GetValue<string>() == stream)
        {
            last["text"] = NotebookCell.TextOf(last["text"]) + text;
            return;
        }
        Cell.Outputs.Add(new JsonObject { ["output_type"] = "stream", ["name"] = stream, ["text"] = text });
    }

    public void Show(ChildMessage message)
    {
        var data = message.Data ?? [];
        if (!Allows(data))
        {
            return;
        }
        var output = new JsonObject
        {
            ["output_type"] = message.Kind == ChildMessageKind.Result ? "execute_result" : "display_data",
            ["data"] = Bundle(data),
            ["metadata"] = new JsonObject(),
        };
        if (message.Kind == ChildMessageKind.Result)
        {
            output["execution_count"] = Number;
        }
        Cell.Outputs.Add(output);
        if (message.ValueId is { } id)
        {
            _shown[id] = output;
        }
    }

    /// <summary>Replaces a value that this cell showed earlier; says whether it did show it.</summary>
    public bool Update(ChildMessage message)
    {
        if (message.ValueId is not { } id || !_shown.TryGetValue(id, out var output))
        {
            return false;
        }
        var data = message.Data ?? [];
        // A replaced value takes the place of the old one, so that it costs no more room than it adds.
        _size -= output["data"]!.AsObject().Sum(pair => (long)NotebookCell.TextOf(pair.Value).Length);
        if (Allows(data))
        {
            output["data"] = Bundle(data);
        }
        return true;
    }

    private bool Allows(Dictionary<string, string> data)
    {
        if (_size > MostShown)
        {
            return false;
        }
        _size += data.Sum(pair => (long)pair.Value.Length);
        if (_size > MostShown)
        {
            AddText("stderr", "… what this cell shows from here on is left out: it is more than a report can hold.\n");
            return false;
        }
        return true;
    }

    private static JsonObject Bundle(Dictionary<string, string> data)
    {
        var bundle = new JsonObject();
        foreach (var (type, value) in data)
        {
            bundle[type] = IsJson(type) ? JsonOrText(value) : value;
        }
        return bundle;
    }

    private static bool IsJson(string type) =>
        type == "application/json" || (type.StartsWith("application/", StringComparison.Ordinal) && type.EndsWith("+json", StringComparison.Ordinal));

    private static JsonNode? JsonOrText(string value)
    {
        try
        {
            return JsonNode.Parse(value);
        }
        catch (JsonException)
        {
            return value;
        }
    }
}
