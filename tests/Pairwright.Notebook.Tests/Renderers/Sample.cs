using Pairwright.Notebook.Drawing;
using Pairwright.Notebook.Renderers;

namespace Pairwright.Notebook.Tests.Renderers;

/// <summary>What a renderer made of one object.</summary>
internal sealed record Sample(string Name, string Plain, string Html, byte[]? Png, string Unit, Type Type, object Value)
{
    public static Sample Of<T>(Renderer<T> renderer, T value, string unit)
        where T : notnull =>
        new(renderer.GetType().Name, renderer.Plain(value), renderer.Html(value), renderer.HasPicture ? renderer.Picture(value).ToPng() : null, unit, typeof(T), value);

    public override string ToString() => Name;
}
