using System.Text;

namespace Pairwright.Runner.Execution;

/// <summary>Prepares a cell's text for the kernel.</summary>
internal static class CellSource
{
    /// <summary>
    /// Makes lines harmless that only bring this library into another host (the library is already here, and a second copy
    /// of it would be another type), and gives every line its place, so that errors can say <c>cell[3]: line 2</c>.
    /// </summary>
    public static string Prepare(JobCell cell)
    {
        var code = new StringBuilder();
        Place(code, cell, 1);
        var line = 0;
        foreach (var text in cell.Code.ReplaceLineEndings("\n").Split('\n'))
        {
            line++;
            if (BringsThisLibrary(text) || NamesLocalFeed(text))
            {
                code.Append("// ").Append(text).Append('\n');
                continue;
            }

            code.Append(text).Append('\n');
            if (IsDirective(text))
            {
                // The kernel splits a submission at its directives; what follows would begin at line 1 again.
                Place(code, cell, line + 1);
            }
        }
        return code.ToString();
    }

    private static void Place(StringBuilder code, JobCell cell, int line) =>
        code.Append("#line ").Append(line).Append(" \"cell[").Append(cell.Label).Append("]\"\n");

    private static bool IsDirective(string line)
    {
        var text = line.TrimStart();
        return text.StartsWith("#r", StringComparison.Ordinal) && !text.StartsWith("#region", StringComparison.Ordinal)
            || text.StartsWith("#i", StringComparison.Ordinal) && !text.StartsWith("#if", StringComparison.Ordinal)
            || text.StartsWith("#!", StringComparison.Ordinal);
    }

    private static bool BringsThisLibrary(string line)
    {
        if (Argument(line, "#r") is not { } argument)
        {
            return false;
        }
        var name = argument.StartsWith("nuget:", StringComparison.OrdinalIgnoreCase)
            ? argument["nuget:".Length..].Split(',')[0].Trim()
            : argument.Split('/', '\\')[^1];
        return name.Equals("Pairwright", StringComparison.OrdinalIgnoreCase)
            || name.StartsWith("Pairwright.", StringComparison.OrdinalIgnoreCase);
    }

    /// <summary>A feed in a folder serves this library to other hosts; where it is missing it must not stop a run.</summary>
    private static bool NamesLocalFeed(string line) =>
        Argument(line, "#i") is { } argument && !argument.Contains("://", StringComparison.Ordinal);

    private static string? Argument(string line, string directive)
    {
        var text = line.Trim();
        if (!text.StartsWith(directive, StringComparison.Ordinal))
        {
            return null;
        }
        var rest = text[directive.Length..].Trim();
        var end = rest.Length > 1 && rest[0] == '"' ? rest.IndexOf('"', 1) : -1;
        return end > 0 ? rest[1..end] : null;
    }
}
