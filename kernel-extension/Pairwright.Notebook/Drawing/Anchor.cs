namespace Pairwright.Notebook.Drawing;

/// <summary>Which part of a text stands at its position.</summary>
internal enum Anchor
{
    Start,
    Middle,
    End,
}
