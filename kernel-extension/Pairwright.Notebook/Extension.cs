using Microsoft.DotNet.Interactive;
using Microsoft.DotNet.Interactive.Commands;
using Pairwright.Notebook.Renderers;

namespace Pairwright.Notebook;

/// <summary>The entry of the notebook extension.</summary>
/// <remarks>
/// <c>#r "nuget: Pairwright.Notebook"</c> finds it by itself, through the package's <c>extension.dib</c>; the headless runner
/// calls it directly; a notebook that names the assembly by its path says
/// <c>await Pairwright.Notebook.Extension.Load();</c> in the same cell.
/// </remarks>
public static class Extension
{
    /// <summary>Loads the extension into the kernel that runs the calling cell. Loading twice does no harm.</summary>
    /// <exception cref="UserErrorException">It was not called from a notebook cell.</exception>
    public static Task Load() =>
        Load(KernelInvocationContext.Current?.HandlingKernel
            ?? throw new UserErrorException("Extension.Load() is for a notebook cell; elsewhere give it the kernel."));

    /// <summary>Registers the renderers and gives the C# kernel the references and <c>using</c> lines of the library. Loading twice does no harm.</summary>
    /// <param name="kernel">The kernel, or the composite that holds it.</param>
    /// <exception cref="UserErrorException">There is no C# kernel.</exception>
    public static Task Load(Kernel kernel)
    {
        ArgumentNullException.ThrowIfNull(kernel);
        RendererRegistry.RegisterAll();
        var csharp = kernel.RootKernel.FindKernelByName("csharp")
            ?? throw new UserErrorException("This notebook has no C# kernel; choose .NET (C#) in your notebook editor and load the extension again.");
        // Deferred to the next cell: what a command within a running cell declares is lost when that cell ends.
        csharp.DeferCommand(new SubmitCode(Opening()));
        return Task.CompletedTask;
    }

    /// <summary>The library as a reference, for a notebook that named only this assembly, and one line for each namespace, so that a cell needs none.</summary>
    private static string Opening()
    {
        string[] references = [typeof(VerdictRecord).Assembly.Location, typeof(Extension).Assembly.Location];
        return string.Join('\n', [.. references.Select(path => $"#r \"{path}\""), .. Namespaces().Select(name => $"using {name};")]);
    }

    private static IEnumerable<string> Namespaces() =>
        typeof(VerdictRecord).Assembly.GetExportedTypes()
            .Select(type => type.Namespace)
            .OfType<string>()
            .Append(typeof(PairDrawings).Namespace!)
            .Distinct()
            .Order(StringComparer.Ordinal);
}
