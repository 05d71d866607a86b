using System.Security.Cryptography;
using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace Pairwright.Runner.Documents;

/// <summary>A notebook file in nbformat 4. What this class does not know, it leaves alone.</summary>
/// <remarks>
/// Our own small reader and writer: the host's document library turns raw cells into code, drops attachments and adds no
/// missing identifiers. nbformat 4.5: https://nbformat.readthedocs.io/en/latest/format_description.html
/// </remarks>
internal sealed class NotebookDocument
{
    private static readonly JsonSerializerOptions Written = new()
    {
        WriteIndented = true,
        IndentSize = 1,
        Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping,
    };

    private readonly JsonObject _json;
    private readonly List<NotebookCell> _cells;

    private NotebookDocument(string path, string sha256, JsonObject json, List<NotebookCell> cells)
    {
        Path = path;
        Sha256 = sha256;
        _json = json;
        _cells = cells;
    }

    /// <summary>The full path of the file.</summary>
    public string Path { get; }

    /// <summary>SHA-256 of the file as it was read, in lower-case hexadecimal.</summary>
    public string Sha256 { get; }

    public IReadOnlyList<NotebookCell> Cells => _cells;

    public NotebookCell? ParametersCell => _cells.Find(cell => cell.IsCode && cell.Tags.Contains(NotebookCell.ParametersTag));

    /// <summary>The first heading of the notebook, or the file's name.</summary>
    public string Title
    {
        get
        {
            var heading = _cells.Where(cell => cell.IsMarkdown).Select(FirstHeading).FirstOrDefault(text => text is not null);
            return heading ?? System.IO.Path.GetFileNameWithoutExtension(Path);
        }
    }

    /// <summary>Reads a notebook and makes it valid nbformat 4.5.</summary>
    /// <exception cref="BadUsageException">The file is missing, empty, not a notebook, or not one in C#.</exception>
    public static NotebookDocument Read(string path)
    {
        var full = System.IO.Path.GetFullPath(path);
        if (Directory.Exists(full))
        {
            throw new BadUsageException($"{path} is a folder; name a notebook file (.ipynb).");
        }
        if (!File.Exists(full))
        {
            throw new BadUsageException($"There is no notebook {path}; check the name and the folder you are in.");
        }

        byte[] bytes;
        try
        {
            bytes = File.ReadAllBytes(full);
        }
        catch (Exception failure) when (failure is IOException or UnauthorizedAccessException)
        {
            throw new BadUsageException($"The notebook {path} cannot be read ({failure.Message.TrimEnd('.')}); check its access rights.");
        }

        var text = Encoding.UTF8.GetString(bytes).TrimStart('\uFEFF');
        if (string.IsNullOrWhiteSpace(text))
        {
            throw new BadUsageException($"The notebook {path} is an empty file; save it again from your notebook editor.");
        }

        var json = Parse(path, text);
        var cells = CellsOf(path, json);
        RequireCSharp(path, json);
        BringToCurrentFormat(path, json, cells);
        return new NotebookDocument(full, Convert.ToHexStringLower(SHA256.HashData(bytes)), json, cells);
    }

    /// <summary>Puts a code cell behind another, in place of one that an earlier run injected.</summary>
    public void InjectAfter(NotebookCell cell, NotebookCell injected)
    {
        RemoveInjected();
        var array = (JsonArray)_json["cells"]!;
        var index = _cells.IndexOf(cell) + 1;
        _cells.Insert(index, injected);
        array.Insert(index, injected.Json);
        GiveIdentifiers(_cells);
    }

    /// <summary>Takes out cells that an earlier run injected: their values were that run's.</summary>
    public void RemoveInjected()
    {
        var array = (JsonArray)_json["cells"]!;
        foreach (var old in _cells.Where(cell => cell.IsInjected).ToList())
        {
            _cells.Remove(old);
            array.Remove(old.Json);
        }
    }

    public string ToJson() => _json.ToJsonString(Written) + "\n";

    /// <summary>The text of the first heading line in a markdown cell, or null.</summary>
    public static string? FirstHeading(NotebookCell cell) =>
        cell.Source.Split('\n')
            .Select(line => line.Trim())
            .Where(line => line.StartsWith('#'))
            .Select(line => line.TrimStart('#').Trim())
            .FirstOrDefault(line => line.Length > 0);

    private static JsonObject Parse(string path, string text)
    {
        try
        {
            // Duplicate keys only surface when the object is first used: use it here, where they can be reported.
            var node = JsonNode.Parse(text, documentOptions: new JsonDocumentOptions { AllowTrailingCommas = false });
            if (node is JsonObject json)
            {
                _ = json.ToJsonString();
                return json;
            }
        }
        catch (Exception failure) when (failure is JsonException or ArgumentException)
        {
            var where = failure is JsonException { LineNumber: { } line } ? $" (line {line + 1} does not read as JSON)" : "";
            throw new BadUsageException($"{path} is not a notebook{where}; save it again from your notebook editor as .ipynb.");
        }
        throw new BadUsageException($"{path} is JSON but not a notebook; save it again from your notebook editor as .ipynb.");
    }

    private static List<NotebookCell> CellsOf(string path, JsonObject json)
    {
        if (json["nbformat"] is not JsonValue format || !format.TryGetValue<int>(out var major))
        {
            throw new BadUsageException($"{path} is JSON but not a notebook: it has no nbformat number; save it again from your notebook editor as .ipynb.");
        }
        if (major != 4)
        {
            throw new BadUsageException($"{path} is in notebook format {major}, and this program reads format 4; save it again with a current notebook editor.");
        }
        if (json["cells"] is not JsonArray array || array.Any(cell => cell is not JsonObject))
        {
            throw new BadUsageException($"{path} is not a whole notebook: its list of cells is missing or damaged; save it again from your notebook editor.");
        }

        var cells = array.Select(cell => new NotebookCell((JsonObject)cell!)).ToList();
        if (!cells.Exists(cell => cell.IsCode && !string.IsNullOrWhiteSpace(cell.Source)))
        {
            throw new BadUsageException($"{path} has no code cell, so there is nothing to run; write at least one.");
        }
        return cells;
    }

    private static void RequireCSharp(string path, JsonObject json)
    {
        var kernel = json["metadata"]?["kernelspec"];
        var language = NotebookCell.TextOf(kernel?["language"]);
        var name = NotebookCell.TextOf(kernel?["name"]);
        var ours = language.Equals("C#", StringComparison.OrdinalIgnoreCase)
            || language.Equals("csharp", StringComparison.OrdinalIgnoreCase)
            || name == ".net-csharp";
        if (!ours && language.Length > 0)
        {
            throw new BadUsageException($"{path} is a notebook in {language}, and this program runs notebooks in C#; choose the .NET (C#) kernel in your notebook editor.");
        }
    }

    private static void BringToCurrentFormat(string path, JsonObject json, List<NotebookCell> cells)
    {
        // 4.5 brought identifiers and nothing that 4.0 to 4.4 would read otherwise; a later minor version stays as it is.
        var minor = json["nbformat_minor"] is JsonValue value && value.TryGetValue<int>(out var read) ? read : 0;
        json["nbformat_minor"] = Math.Max(minor, 5);
        if (json["metadata"] is not JsonObject)
        {
            json["metadata"] = new JsonObject();
        }

        foreach (var cell in cells)
        {
            if (cell.Kind is not ("code" or "markdown" or "raw"))
            {
                throw new BadUsageException($"{path} has a cell of the unknown kind '{cell.Kind}'; save it again from your notebook editor.");
            }
            if (cell.Json["metadata"] is not JsonObject)
            {
                cell.Json["metadata"] = new JsonObject();
            }
            if (cell.Json["source"] is null)
            {
                cell.Json["source"] = "";
            }
            if (cell.IsCode)
            {
                cell.ClearOutputs();
            }
        }
        GiveIdentifiers(cells);
    }

    /// <summary>Gives every cell without an identifier, or with one that is taken, its place in the notebook as one.</summary>
    private static void GiveIdentifiers(List<NotebookCell> cells)
    {
        var taken = new HashSet<string>(StringComparer.Ordinal);
        var without = new List<NotebookCell>();
        foreach (var cell in cells)
        {
            var id = NotebookCell.TextOf(cell.Json["id"]);
            if (id.Length is 0 or > 64 || !id.All(IsIdentifierCharacter) || !taken.Add(id))
            {
                without.Add(cell);
            }
        }
        foreach (var cell in without)
        {
            var place = cells.IndexOf(cell) + 1;
            var id = $"cell-{place}";
            for (var attempt = 2; !taken.Add(id); attempt++)
            {
                id = $"cell-{place}-{attempt}";
            }
            cell.Json["id"] = id;
        }
    }

    private static bool IsIdentifierCharacter(char c) => char.IsAsciiLetterOrDigit(c) || c is '-' or '_';
}
