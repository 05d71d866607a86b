using Microsoft.DotNet.Interactive;
using Microsoft.DotNet.Interactive.Commands;
using Pairwright.Notebook.Renderers;

namespace Pairwright.Notebook;

/// <summary>The entry of the notebook extension: <c>extension.dib</c> calls it in Jupyter's kernel, the headless runner directly.</summary>
public static class Extension
{
    /// <summary>Registers the renderers and gives the C# kernel the <c>using</c> lines of the library. Loading twice does no harm.</summary>
    /// <param name="kernel">The kernel, or the composite that holds it.</param>
    public static async Task Load(Kernel kernel)
    {
        ArgumentNullException.ThrowIfNull(kernel);
        NativeLibraries.Find();
        RendererRegistry.RegisterAll();
        var result = await kernel.RootKernel.SendAsync(new SubmitCode(Usings(), targetKernelName: "csharp"));
        if (result.Events.OfType<Microsoft.DotNet.Interactive.Events.CommandFailed>().FirstOrDefault() is { } failed)
        {
            throw new InvalidOperationException($"The library's namespaces could not be opened in the notebook: {failed.Message}");
        }
    }

    /// <summary>One line for each namespace of the library and one for the drawings, so that a cell needs none.</summary>
    internal static string Usings() => string.Join('\n', Namespaces().Select(name => $"using {name};"));

    private static IEnumerable<string> Namespaces() =>
        typeof(VerdictRecord).Assembly.GetExportedTypes()
            .Select(type => type.Namespace)
            .OfType<string>()
            .Append(typeof(PairDrawings).Namespace!)
            .Distinct()
            .Order(StringComparer.Ordinal);
}
