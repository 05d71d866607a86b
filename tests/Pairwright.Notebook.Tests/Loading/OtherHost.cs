using System.Diagnostics;
using System.Text.Json;

namespace Pairwright.Notebook.Tests.Loading;

/// <summary>Runs cells in a notebook host that knows nothing of this library, in a process of its own.</summary>
internal static class OtherHost
{
    /// <summary>The folder that the project stands in.</summary>
    public static string Root { get; } = FindRoot();

    /// <summary><c>Debug</c> or <c>Release</c>: as these tests were built.</summary>
    public static string Configuration { get; } = new DirectoryInfo(AppContext.BaseDirectory).Parent!.Name;

    /// <returns>For each cell what it left, by MIME type; its failure as <c>error</c>.</returns>
    public static async Task<IReadOnlyList<Dictionary<string, string>>> RunAsync(string folder, params string[] cells)
    {
        var list = Path.Combine(folder, "cells.json");
        await File.WriteAllTextAsync(list, JsonSerializer.Serialize(cells));
        var output = await Run(folder, Path.Combine(Root, "tests", "NotebookHost", "bin", Configuration, "net10.0", "NotebookHost.dll"), list);
        return JsonSerializer.Deserialize<List<Dictionary<string, string>>>(output)!;
    }

    /// <summary>Runs <c>dotnet</c>, and returns what it printed.</summary>
    public static async Task<string> Run(string folder, params string[] arguments)
    {
        using var process = Process.Start(new ProcessStartInfo("dotnet", arguments)
        {
            WorkingDirectory = folder,
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        })!;
        var errors = process.StandardError.ReadToEndAsync();
        var output = await process.StandardOutput.ReadToEndAsync();
        await process.WaitForExitAsync();
        return process.ExitCode == 0 ? output : throw new InvalidOperationException($"{string.Join(' ', arguments)}: {output} {await errors}");
    }

    private static string FindRoot()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (!File.Exists(Path.Combine(folder.FullName, "Extension.sln")))
        {
            folder = folder.Parent ?? throw new InvalidOperationException("The tests do not lie below the folder with Extension.sln.");
        }
        return folder.FullName;
    }
}
