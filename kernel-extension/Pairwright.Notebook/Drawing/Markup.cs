using System.Net;
using System.Text;

namespace Pairwright.Notebook.Drawing;

/// <summary>Text that is already HTML or SVG. Everything else is a plain string and is escaped on its way into a page.</summary>
internal readonly record struct Markup(string Text)
{
    public static Markup Empty { get; } = new("");

    /// <summary>The markup that shows a plain string as it is, whatever it holds.</summary>
    public static Markup Of(string? plain) => new(Escape(plain));

    /// <summary>Escapes a plain string for element content and for attributes in double quotes.</summary>
    /// <remarks>Control characters that XML forbids become a visible replacement, so that a page stays well-formed.</remarks>
    public static string Escape(string? plain)
    {
        var clean = new StringBuilder();
        foreach (var rune in (plain ?? "").EnumerateRunes())
        {
            clean.Append(IsForbidden(rune.Value) ? "\uFFFD" : rune.ToString());
        }

        return WebUtility.HtmlEncode(clean.ToString());
    }

    public static Markup operator +(Markup first, Markup second) => new(first.Text + second.Text);

    public static Markup Concat(IEnumerable<Markup> parts) => new(string.Concat(parts.Select(part => part.Text)));

    public override string ToString() => Text;

    private static bool IsForbidden(int c) => (c < ' ' && c is not ('\t' or '\n' or '\r')) || c is 0xFFFE or 0xFFFF;
}
