using Microsoft.DotNet.Interactive.Formatting;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>How one type of the library draws itself in a notebook, in a saved page and in a terminal.</summary>
/// <remarks>A renderer only draws: it computes nothing that the object does not hold, and it never fails because a value is missing.</remarks>
internal abstract class Renderer<T> : IRenderer
{
    public void Register()
    {
        Formatter.Register<T>((value, writer) => writer.Write(Plain(value)), "text/plain");
        Formatter.Register<T>((value, writer) => writer.Write(Html(value)), "text/html");
        if (!HasPicture)
        {
            Formatter.SetPreferredMimeTypesFor(typeof(T), "text/html", "text/plain");
            return;
        }

        Formatter.Register<T>((value, writer) => writer.Write(Convert.ToBase64String(Picture(value).ToPng())), "image/png");
        Formatter.SetPreferredMimeTypesFor(typeof(T), "text/html", "image/png", "text/plain");
    }

    /// <summary>A few lines for a terminal.</summary>
    public abstract string Plain(T value);

    /// <summary>The sheet for a page.</summary>
    public abstract Card Draw(T value);

    public string Html(T value) => Draw(value).ToHtml();

    /// <summary>Whether the object is a picture, so that it has <c>image/png</c> as well.</summary>
    public virtual bool HasPicture => false;

    /// <summary>The picture of an object that is one.</summary>
    public virtual Raster Picture(T value) => throw new NotSupportedException($"{typeof(T).Name} is not a picture.");

    /// <summary>Lines of text as one.</summary>
    protected static string Lines(params IEnumerable<string?> lines) => string.Join('\n', lines.OfType<string>());
}
