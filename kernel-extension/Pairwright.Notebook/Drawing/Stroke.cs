namespace Pairwright.Notebook.Drawing;

/// <summary>How a line is drawn.</summary>
internal sealed record Stroke(string Colour, double Width = 1, string? Dashes = null, double Opacity = 1)
{
    public static Stroke Hair { get; } = new(Ink.Grid);

    public static Stroke Frame { get; } = new(Ink.Frame);
}
