using System.Reflection;
using System.Runtime.InteropServices;
using System.Runtime.Loader;

namespace Pairwright.Notebook;

/// <summary>Finds OpenCV's native library beside the managed ones when a notebook loads them by path.</summary>
/// <remarks>
/// A package reference brings the native library along; a plain <c>#r "….dll"</c> does not, because nobody reads this
/// assembly's list of dependencies then. It must be found before its first use: a type initializer that failed stays failed.
/// </remarks>
internal static class NativeLibraries
{
    private static readonly Lock Gate = new();
    private static bool _hooked;

    public static void Find()
    {
        lock (Gate)
        {
            if (_hooked)
            {
                return;
            }
            _hooked = true;
        }
        var here = Path.GetDirectoryName(typeof(NativeLibraries).Assembly.Location);
        var context = AssemblyLoadContext.GetLoadContext(typeof(VerdictRecord).Assembly);
        if (context is null || string.IsNullOrEmpty(here))
        {
            return;
        }
        context.ResolvingUnmanagedDll += (_, name) => Beside(here, name);
    }

    private static nint Beside(string folder, string name)
    {
        string[] names = [name, $"{name}.so", $"lib{name}.so"];
        string[] folders = [folder, Path.Combine(folder, "runtimes", RuntimeInformation.RuntimeIdentifier, "native"), Path.Combine(folder, "runtimes", "linux-x64", "native")];
        foreach (var path in folders.SelectMany(_ => names, Path.Combine).Where(File.Exists))
        {
            if (NativeLibrary.TryLoad(path, out var handle))
            {
                return handle;
            }
        }
        return 0;
    }
}
