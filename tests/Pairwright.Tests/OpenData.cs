using System.Runtime.CompilerServices;
using Xunit;

namespace Pairwright.Tests;

/// <summary>Finds the real captures that <c>tests/open-data</c> unpacks from Debian's package opencv-doc.</summary>
/// <remarks>
/// A test that asks for a file which is not there is skipped with the reason (mark it <c>[SkippableFact]</c>); where the
/// environment variable <c>CI</c> is <c>true</c> it fails, so that a build server cannot lose a check in silence.
/// </remarks>
internal static class OpenData
{
    /// <summary>The folder of 13 left/right captures of a checkerboard: 9 × 6 inner corners, 25 mm squares, 640 × 480.</summary>
    public static string Boards => Folder("boards");

    /// <summary>A file of the cache, for example <c>Find("aloe/aloeL.jpg")</c>.</summary>
    public static string Find(string name)
    {
        var path = Path.Combine(Root, name);
        Require(File.Exists(path), path);
        return path;
    }

    /// <summary>A folder of the cache, for example <c>Folder("two-views")</c>.</summary>
    public static string Folder(string name)
    {
        var path = Path.Combine(Root, name);
        Require(Directory.Exists(path), path);
        return path;
    }

    private static string Root
    {
        get
        {
            var chosen = Environment.GetEnvironmentVariable("PAIRWRIGHT_OPEN_DATA");
            return string.IsNullOrEmpty(chosen)
                ? Path.GetFullPath(Path.Combine(SourceFolder(), "..", ".cache", "open-data"))
                : Path.GetFullPath(chosen);
        }
    }

    private static void Require(bool there, string path)
    {
        var reason = $"{path} is missing: run tests/open-data, which fetches it from Debian's package opencv-doc.";
        if (Environment.GetEnvironmentVariable("CI") == "true")
        {
            Assert.True(there, reason);
        }
        Skip.IfNot(there, reason);
    }

    private static string SourceFolder([CallerFilePath] string path = "") => Path.GetDirectoryName(path)!;
}
