namespace Pairwright.Notebook.Drawing;

/// <summary>The colours of every drawing. Text colours reach a contrast of at least 4.5 : 1 on <see cref="Paper"/> (WCAG 2.1, 1.4.3).</summary>
internal static class Ink
{
    public const string Paper = "#fdfdfb";
    public const string Panel = "#f3f4f0";
    public const string Text = "#1c2830";
    public const string Quiet = "#54626d";
    public const string Grid = "#dde1e2";
    public const string Frame = "#aeb7bc";

    public const string Left = "#17609c";
    public const string Right = "#b04a10";
    public const string Third = "#5d4a9c";
    public const string Overlay = "#ffd23f";

    public const string Met = "#1a6b40";
    public const string NotMet = "#a3242b";
    public const string Undecided = "#7a5a00";

    /// <summary>Colours that tell a few things over one another apart; all are dark enough for thin lines on paper.</summary>
    public static IReadOnlyList<string> Series { get; } = [Left, Right, "#2b7a4b", Third, "#9b2d6b", "#6b6a12", "#0f7a80", "#7d4a2c"];

    /// <summary>Bright colours for lines over pictures.</summary>
    public static IReadOnlyList<string> Bright { get; } =
        ["#ffd23f", "#4cc9f0", "#ff7a59", "#7ae582", "#f08cff", "#ffffff", "#ffae00", "#9fb4ff", "#00e0c6", "#ff9fb2"];
}
