namespace Pairwright.Notebook.Renderers;

/// <summary>The one place where renderers are registered: add a line here for each typed object that draws itself.</summary>
internal static class RendererRegistry
{
    /// <summary>Registers every renderer of this extension with the notebook's formatters. Registering twice does no harm.</summary>
    public static void RegisterAll()
    {
    }
}
