using System.Text;

namespace Pairwright.Notebook.Drawing;

/// <summary>The sheet that one object draws of itself: a title, numbers, figures, notes and, folded away, where it came from.</summary>
/// <remarks>A card brings its own light ground and its own styles, so that it reads the same in a dark notebook and in a saved page.</remarks>
internal sealed class Card(string title, string? subtitle = null)
{
    private const string Style =
        ".pw-card{background:#fdfdfb;color:#1c2830;color-scheme:light;border:1px solid #c9cfd2;border-radius:6px;padding:12px 16px;margin:6px 0;"
        + "font:14px/1.45 system-ui,-apple-system,\"Segoe UI\",Roboto,\"Noto Sans\",sans-serif;max-width:1000px;box-sizing:border-box;text-align:left}"
        + ".pw-card .pw-h{font-size:16px;font-weight:650;margin:0}.pw-card .pw-sub{color:#54626d;margin:1px 0 8px}"
        + ".pw-card .pw-facts{display:grid;grid-template-columns:repeat(auto-fill,minmax(230px,1fr));gap:5px 18px;margin:8px 0}"
        + ".pw-card .pw-facts div{border-left:3px solid #c9d6de;padding-left:8px}"
        + ".pw-card .pw-facts .pw-k{display:block;color:#54626d;font-size:12px;border:0;padding:0}"
        + ".pw-card .pw-facts .pw-v{font-variant-numeric:tabular-nums;border:0;padding:0}"
        + ".pw-card table{border-collapse:collapse;margin:8px 0;font-size:13px;font-variant-numeric:tabular-nums;color:#1c2830;background:transparent}"
        + ".pw-card th{text-align:left;font-weight:600;color:#54626d;border-bottom:1px solid #aeb7bc;padding:2px 12px 3px 0;background:transparent}"
        + ".pw-card td{border-bottom:1px solid #e6e9ea;padding:2px 12px 2px 0;text-align:left;background:transparent;vertical-align:top}"
        + ".pw-card td.pw-n,.pw-card th.pw-n{text-align:right}"
        + ".pw-card .pw-row{display:flex;flex-wrap:wrap;gap:10px 14px;align-items:flex-start;margin:8px 0}.pw-card .pw-row>div{min-width:0}"
        + ".pw-card .pw-cap{color:#54626d;font-size:12.5px;margin:2px 0 0 0;max-width:62em}"
        + ".pw-card .pw-note{margin:5px 0;padding:4px 10px;border-left:3px solid #7d93a1;background:#eef2f4}"
        + ".pw-card .pw-warn{border-left-color:#9a6b00;background:#fbf3dc}"
        + ".pw-card details{margin-top:8px;color:#54626d;font-size:12.5px}.pw-card summary{cursor:pointer}"
        + ".pw-card code{font-family:ui-monospace,Menlo,Consolas,\"DejaVu Sans Mono\",monospace;font-size:12px;background:transparent;color:inherit;overflow-wrap:anywhere}";

    private readonly StringBuilder body = new();

    /// <summary>Numbers that matter, each under its name.</summary>
    public Card Facts(params IEnumerable<(string Name, string Value)> facts)
    {
        body.Append("<div class=\"pw-facts\">");
        foreach (var (name, value) in facts)
        {
            body.Append($"<div><span class=\"pw-k\">{Markup.Escape(name)}</span><span class=\"pw-v\">{Markup.Escape(value)}</span></div>");
        }

        body.Append("</div>");
        return this;
    }

    /// <summary>A table; columns after the first are numbers and stand to the right.</summary>
    public Card Table(IEnumerable<string> heads, IEnumerable<IEnumerable<string>> rows, int textColumns = 1)
    {
        body.Append(TableOf(heads, rows, textColumns));
        return this;
    }

    /// <summary>A sentence.</summary>
    public Card Note(string text) => Paragraph("pw-note", text);

    /// <summary>A sentence that asks for attention: it begins with the word, so that colour is not needed.</summary>
    public Card Warning(string text) => Paragraph("pw-note pw-warn", "Attention: " + text);

    /// <summary>Each sentence that asks for attention on its own.</summary>
    public Card Warnings(IEnumerable<string> texts) => texts.Aggregate(this, (card, text) => card.Warning(text));

    public Card Caption(string text) => Paragraph("pw-cap", text);

    /// <summary>Drawings beside one another, as far as the page is wide.</summary>
    public Card Row(params IEnumerable<Svg> drawings)
    {
        body.Append("<div class=\"pw-row\">");
        foreach (var drawing in drawings)
        {
            body.Append($"<div>{drawing.ToMarkup()}</div>");
        }

        body.Append("</div>");
        return this;
    }

    /// <summary>Drawings beside one another, the members of each group above one another.</summary>
    public Card Columns(params IEnumerable<IEnumerable<Svg>> columns)
    {
        body.Append("<div class=\"pw-row\">");
        foreach (var column in columns)
        {
            body.Append($"<div>{Markup.Concat(column.Select(drawing => new Markup($"<div>{drawing.ToMarkup()}</div>")))}</div>");
        }

        body.Append("</div>");
        return this;
    }

    public Card Raw(Markup markup)
    {
        body.Append(markup);
        return this;
    }

    /// <summary>Something folded away.</summary>
    public Card Details(string summary, Markup content)
    {
        body.Append($"<details><summary>{Markup.Escape(summary)}</summary>{content}</details>");
        return this;
    }

    /// <summary>Where the object came from, folded away.</summary>
    public Card From(Provenance provenance)
    {
        if (provenance.Inputs.IsEmpty && provenance.Steps.IsEmpty)
        {
            return this;
        }

        var text = new StringBuilder();
        if (!provenance.Steps.IsEmpty)
        {
            text.Append(TableOf(["step", "settings"], provenance.Steps.Select(step => new[] { step.Name, step.Settings }), 2));
        }

        if (!provenance.Inputs.IsEmpty)
        {
            text.Append(TableOf(["file", "SHA-256"], provenance.Inputs.Select(input => new[] { input.Name, input.Sha256 }), 2));
        }

        text.Append($"<p>Pairwright {Markup.Escape(Provenance.Version)}</p>");
        return Details("Where this came from", new(text.ToString()));
    }

    public string ToHtml()
    {
        var under = subtitle is null ? "" : $"<p class=\"pw-sub\">{Markup.Escape(subtitle)}</p>";
        return $"<div class=\"pw-card\"><style>{Style}</style><p class=\"pw-h\">{Markup.Escape(title)}</p>{under}{body}</div>";
    }

    internal static string TableOf(IEnumerable<string> heads, IEnumerable<IEnumerable<string>> rows, int textColumns = 1)
    {
        var table = new StringBuilder("<table><thead><tr>");
        foreach (var (index, head) in heads.Index())
        {
            table.Append($"<th{Align(index)}>{Markup.Escape(head)}</th>");
        }

        table.Append("</tr></thead><tbody>");
        foreach (var row in rows)
        {
            table.Append("<tr>");
            foreach (var (index, cell) in row.Index())
            {
                table.Append($"<td{Align(index)}>{Markup.Escape(cell)}</td>");
            }

            table.Append("</tr>");
        }

        return table.Append("</tbody></table>").ToString();

        string Align(int column) => column < textColumns ? "" : " class=\"pw-n\"";
    }

    private Card Paragraph(string style, string text)
    {
        body.Append($"<p class=\"{style}\">{Markup.Escape(text)}</p>");
        return this;
    }
}
