using System.Text.Json.Nodes;
using Markdig;
using Markdig.Renderers;
using Markdig.Syntax;
using Markdig.Syntax.Inlines;
using Pairwright.Runner.Documents;

namespace Pairwright.Runner.Reports;

/// <summary>Turns a markdown cell into HTML that needs no network: pictures come along, HTML in the text is shown as text.</summary>
internal static class MarkdownText
{
    private static readonly MarkdownPipeline Pipeline = new MarkdownPipelineBuilder()
        .UsePipeTables()
        .UseEmphasisExtras()
        .UseAutoIdentifiers()
        .UseFootnotes()
        .DisableHtml()
        .Build();

    private static readonly Dictionary<string, string> PictureTypes = new(StringComparer.OrdinalIgnoreCase)
    {
        [".png"] = "image/png",
        [".jpg"] = "image/jpeg",
        [".jpeg"] = "image/jpeg",
        [".gif"] = "image/gif",
        [".svg"] = "image/svg+xml",
        [".webp"] = "image/webp",
    };

    /// <param name="text">The markdown.</param>
    /// <param name="cell">The cell whose attachments it may show.</param>
    /// <param name="folder">The notebook's folder, where its pictures lie.</param>
    public static string ToHtml(string text, NotebookCell cell, string folder)
    {
        var document = Markdown.Parse(text, Pipeline);
        foreach (var link in document.Descendants<LinkInline>().ToList())
        {
            if (link.IsImage)
            {
                link.Url = Picture(link.Url ?? "", cell, folder);
            }
            else if (!IsHarmless(link.Url ?? ""))
            {
                link.Url = "#";
            }
        }
        foreach (var link in document.Descendants<AutolinkInline>().Where(link => !link.IsEmail && !IsHarmless(link.Url)).ToList())
        {
            link.ReplaceBy(new LiteralInline(link.Url));
        }

        using var writer = new StringWriter();
        var renderer = new HtmlRenderer(writer);
        Pipeline.Setup(renderer);
        renderer.Render(document);
        return writer.ToString();
    }

    private static bool IsHarmless(string url)
    {
        var colon = url.IndexOf(':');
        var slash = url.IndexOfAny(['/', '?', '#']);
        return colon < 0
            || (slash >= 0 && slash < colon)
            || url.StartsWith("https:", StringComparison.OrdinalIgnoreCase)
            || url.StartsWith("http:", StringComparison.OrdinalIgnoreCase)
            || url.StartsWith("mailto:", StringComparison.OrdinalIgnoreCase);
    }

    private static string Picture(string url, NotebookCell cell, string folder)
    {
        if (url.StartsWith("attachment:", StringComparison.Ordinal))
        {
            return Attachment(cell, Uri.UnescapeDataString(url["attachment:".Length..]));
        }
        if (url.StartsWith("data:image/", StringComparison.OrdinalIgnoreCase))
        {
            return url;
        }

        var path = url.Contains("://", StringComparison.Ordinal) ? "" : Path.Combine(folder, Uri.UnescapeDataString(url));
        return PictureTypes.TryGetValue(Path.GetExtension(path), out var type) && File.Exists(path)
            ? $"data:{type};base64,{Convert.ToBase64String(File.ReadAllBytes(path))}"
            : "";
    }

    private static string Attachment(NotebookCell cell, string name)
    {
        if (cell.Json["attachments"]?[name] is JsonObject bundle)
        {
            foreach (var (type, value) in bundle)
            {
                if (type.StartsWith("image/", StringComparison.Ordinal))
                {
                    return $"data:{type};base64,{NotebookCell.TextOf(value).ReplaceLineEndings("")}";
                }
            }
        }
        return "";
    }
}
