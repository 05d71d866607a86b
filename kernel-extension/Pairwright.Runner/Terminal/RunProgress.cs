using Pairwright.Runner.Execution;
using Pairwright.Runner.Reports;
using Spectre.Console;

namespace Pairwright.Runner.Terminal;

/// <summary>Shows a run in the terminal as it goes: a line for each cell, then the verdicts and the files.</summary>
internal sealed class RunProgress(IAnsiConsole console, NotebookRun run)
{
    private const int CaptionWidth = 52;

    /// <summary>A log has no width of its own; a row of the table should stay on one line.</summary>
    private const int LogWidth = 160;

    /// <summary>Whether lines can be rewritten and coloured; in a file or a build server's log they cannot.</summary>
    private readonly bool _live = console.Profile.Capabilities.Interactive && console.Profile.Out.IsTerminal;

    public void Begin()
    {
        Line($"{Path.GetFileName(run.Document.Path)}: {run.Cells.Count} code cells");
        foreach (var (name, value) in run.Parameters)
        {
            Line($"  {name} = {value}");
        }
        if (_live)
        {
            console.Write(new Text("  starting the kernel …"));
        }
    }

    public void Started(CellRun cell)
    {
        if (_live)
        {
            Rewind();
            console.Write(new Text($"{Place(cell)}  …"));
        }
    }

    public void Ended(CellRun cell)
    {
        if (_live)
        {
            Rewind();
        }
        var good = cell.State == CellState.Done;
        console.Write(new Text($"{Place(cell)}{Wording.Seconds(cell.Elapsed),10}  "));
        console.Write(new Text(good ? "✓" : "✗", new Style(good ? Color.Green : Color.Red)));
        console.WriteLine();
    }

    public void End(ReportFiles files)
    {
        if (_live)
        {
            Rewind();
        }
        console.WriteLine();
        if (run.Verdicts.Count > 0)
        {
            if (!_live)
            {
                console.Profile.Width = LogWidth;
            }
            console.Write(Table());
        }
        Line(Wording.Summary(run));
        foreach (var file in files.All)
        {
            Line($"  {file}");
        }
    }

    private Table Table()
    {
        var table = new Table { Border = _live ? TableBorder.Rounded : TableBorder.Ascii2 };
        foreach (var heading in (string[])["requirement", "limit", "measured", "margin", "verdict"])
        {
            table.AddColumn(heading);
        }
        foreach (var record in run.Verdicts.Select(verdict => verdict.Record))
        {
            var colour = record.Outcome switch
            {
                VerdictRecord.Met => Color.Green,
                VerdictRecord.NotMet => Color.Red,
                _ => Color.Yellow,
            };
            table.AddRow(
                new Text(record.Requirement),
                new Text(record.Limit),
                new Text(Wording.Measured(record)),
                new Text(Wording.Margin(record)),
                new Text($"{Wording.Mark(record.Outcome)} {record.Outcome}", new Style(colour)));
        }
        return table;
    }

    private string Place(CellRun cell)
    {
        var place = $"{run.Cells.ToList().IndexOf(cell) + 1}/{run.Cells.Count}";
        var caption = cell.Caption.Length <= CaptionWidth ? cell.Caption : cell.Caption[..(CaptionWidth - 1)] + "…";
        return $"{place,7}  {caption.PadRight(CaptionWidth)}";
    }

    /// <summary>Back to the beginning of the line, and the line away.</summary>
    private void Rewind() => console.Write(new ControlCode("\r\u001b[2K"));

    /// <summary>A whole line, however wide the terminal: paths must stay in one piece.</summary>
    private void Line(string text) => console.Profile.Out.Writer.WriteLine(text);
}
