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

    private readonly LiveLine _line = new(console);

    public void Begin()
    {
        _line.Stand($"{Path.GetFileName(run.Document.Path)}: {run.Cells.Count} code cells");
        foreach (var (name, value) in run.Parameters)
        {
            _line.Stand($"  {name} = {value}");
        }
        _line.Show("  starting the kernel …");
    }

    public void Started(CellRun cell) => _line.Show($"{Place(cell)}  …");

    public void Ended(CellRun cell) => _line.Stand($"{Place(cell)}{Wording.Seconds(cell.Elapsed),10}", good: cell.State == CellState.Done);

    /// <summary>The reports can no longer be written.</summary>
    public void Lost(string sentence)
    {
        _line.Clear();
        Console.Error.WriteLine($"pairwright: The run was ended because its reports cannot be kept: {sentence}");
    }

    public void End(ReportFiles files)
    {
        _line.Stand("");
        if (run.Verdicts.Count > 0)
        {
            if (!_line.IsLive)
            {
                console.Profile.Width = LogWidth;
            }
            console.Write(Table());
        }
        _line.Stand(Wording.Summary(run));
        foreach (var file in files.All)
        {
            _line.Stand($"  {file}");
        }
    }

    private Table Table()
    {
        var table = new Table { Border = _line.IsLive ? TableBorder.Rounded : TableBorder.Ascii2 };
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
}
