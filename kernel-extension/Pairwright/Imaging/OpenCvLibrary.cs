using System.Runtime.InteropServices;
using System.Runtime.Loader;
using System.Text.RegularExpressions;
using OpenCvSharp;

namespace Pairwright.Imaging;

/// <summary>The native library behind codecs and board corners: loaded once, with one clear sentence where it cannot be.</summary>
internal static partial class OpenCvLibrary
{
    private static readonly Lazy<string> LoadedVersion = new(Load);

    /// <summary>The library's version. Asking for it loads the library.</summary>
    /// <exception cref="UserErrorException">The library, or one that it needs, is missing.</exception>
    public static string Version => LoadedVersion.Value;

    /// <summary>Loads the library unless it is loaded. Called before the first use of any of its types.</summary>
    /// <exception cref="UserErrorException">The library, or one that it needs, is missing.</exception>
    public static void Require() => _ = Version;

    /// <summary>The sentence for a library that cannot be loaded, or nothing for a fault of another kind.</summary>
    internal static UserErrorException? Explain(Exception fault)
    {
        for (var inner = fault; inner is not null; inner = inner.InnerException)
        {
            if (inner is DllNotFoundException or BadImageFormatException or EntryPointNotFoundException)
            {
                var missing = MissingLibrary().Match(inner.Message);
                var cause = missing.Success ? $"{missing.Groups[1].Value} is missing" : "it or a library that it needs is missing";
                return new(
                    $"The picture codecs (OpenCV) cannot be loaded because {cause}; on Debian and Ubuntu install the package libgtk-3-0 (apt-get install libgtk-3-0) and start again.",
                    fault);
            }
        }

        return null;
    }

    private static string Load()
    {
        FindBesideThisAssembly();
        try
        {
            // What goes wrong is said by our own sentences; the library's chatter would stand in reports and terminals.
            Cv2.SetLogLevel(LogLevel.SILENT);
            return Cv2.GetVersionString() ?? "unknown";
        }
        catch (Exception fault) when (Explain(fault) is { } explained)
        {
            throw explained;
        }
    }

    /// <remarks>
    /// A program's list of dependencies, or a package reference in a notebook, tells the runtime where the native library
    /// lies. Where an assembly was loaded by its path alone nobody reads such a list; then it is looked for here. This must
    /// happen before the first use: a type initializer that failed stays failed.
    /// </remarks>
    private static void FindBesideThisAssembly()
    {
        var here = Path.GetDirectoryName(typeof(OpenCvLibrary).Assembly.Location);
        if (!string.IsNullOrEmpty(here) && AssemblyLoadContext.GetLoadContext(typeof(Cv2).Assembly) is { } context)
        {
            context.ResolvingUnmanagedDll += (_, name) =>
                NativeLibrary.TryLoad(Path.Combine(here, "runtimes", "linux-x64", "native", $"lib{name}.so"), out var handle) ? handle : 0;
        }
    }

    [GeneratedRegex(@"(lib(?!OpenCvSharpExtern)[A-Za-z0-9_+-]+\.so[.0-9]*): cannot open shared object")]
    private static partial Regex MissingLibrary();
}
