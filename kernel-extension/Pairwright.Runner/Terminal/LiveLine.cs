using Spectre.Console;

namespace Pairwright.Runner.Terminal;

/// <summary>The last line of a terminal, which is written again and again until it stands; in a file or a build server's log only what stands is written.</summary>
internal sealed class LiveLine(IAnsiConsole console)
{
    /// <summary>Whether lines can be rewritten and coloured.</summary>
    public bool IsLive { get; } = console.Profile.Capabilities.Interactive && console.Profile.Out.IsTerminal;

    /// <summary>Shows a text until the next one.</summary>
    public void Show(string text)
    {
        if (IsLive)
        {
            Clear();
            var width = Math.Max(console.Profile.Width - 1, 1);
            console.Write(new Text(text.Length <= width ? text : text[..width]));
        }
    }

    /// <summary>Takes the shown text away.</summary>
    public void Clear()
    {
        if (IsLive)
        {
            console.Write(new ControlCode("\r\u001b[2K"));
        }
    }

    /// <summary>A whole line that stands, however wide the terminal: paths must stay in one piece.</summary>
    public void Stand(string text)
    {
        Clear();
        console.Profile.Out.Writer.WriteLine(text);
    }

    /// <summary>A line that stands and ends in a mark for good or bad.</summary>
    public void Stand(string text, bool good)
    {
        Clear();
        if (!IsLive)
        {
            console.Profile.Out.Writer.WriteLine($"{text}  {Mark(good)}");
            return;
        }

        console.Profile.Out.Writer.Write($"{text}  ");
        console.Write(new Text(Mark(good), new Style(good ? Color.Green : Color.Red)));
        console.WriteLine();
    }

    private static string Mark(bool good) => good ? "✓" : "✗";
}
