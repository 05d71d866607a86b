namespace Pairwright.Notebook.Renderers;

/// <summary>A renderer of some type, as the registry sees it.</summary>
internal interface IRenderer
{
    /// <summary>Registers the formatters of its type; again does no harm.</summary>
    void Register();
}
