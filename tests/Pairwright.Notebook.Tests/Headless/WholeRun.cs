using Xunit;
using static Pairwright.Notebook.Tests.Headless.NotebookText;

namespace Pairwright.Notebook.Tests.Headless;

/// <summary>One run of a notebook in which all goes well, shared by the tests that look at what it leaves: a kernel takes seconds to start.</summary>
public sealed class WholeRun : IAsyncLifetime
{
    internal const int Parametric = 3;
    internal const int Streams = 4;
    internal const int Live = 5;
    internal const int Updating = 6;
    internal const int FromPackage = 7;
    internal const int Types = 8;
    internal const int File = 9;
    internal const int Endless = 10;

    internal static IReadOnlyList<Type> LibraryTypes { get; } =
        [.. typeof(VerdictRecord).Assembly.GetExportedTypes().Where(type => !type.IsNested && !type.IsGenericType)];

    internal HeadlessRun Run { get; private set; } = null!;

    public async Task InitializeAsync()
    {
        Run = HeadlessRun.In(Of(
            Markdown("# Planks\n\nSome *text*."),
            Raw("as it is"),
            Parameters("double toleranceMm = 1.5; string folder = \"boards\"; bool strict = false; var views = 13;"),
            Code("#pragma warning disable\nvar twice = () => 2 * toleranceMm;"),
            Code("Console.Write(FormattableString.Invariant($\"{twice()}|{folder}|{strict}|{views}\"));"),
            Code("Console.Write(\"one \"); Console.WriteLine(\"two\"); Console.Error.WriteLine(\"aside\"); 6 * 7"),
            Code(
                """
                using Microsoft.DotNet.Interactive;
                var shown = KernelInvocationContextExtensions.Display(KernelInvocationContext.Current, new DateTime(2001, 1, 1), "text/plain");
                """),
            Code("shown.Update(new DateTime(2002, 2, 2)); display(\"a < b\");"),
            Code("#i \"nuget:../feed-that-is-not-here\"\n#r \"nuget: Pairwright.Notebook, 9.9.9\"\n#r \"../bin/Pairwright.Notebook.dll\"\nawait Pairwright.Notebook.Extension.Load();\nnew UserErrorException(\"here\").Message"),
            Code(string.Concat(LibraryTypes.Select(type => $"Console.WriteLine(typeof({type.Name}).FullName);\n"))),
            Code("System.IO.File.ReadAllText(\"beside.txt\")"),
            Code("var line = new string('x', 1000); for (var i = 0; i < 3000; i++) Console.WriteLine(line);"),
            Code(Verdict("met", "cup")),
            Code(Verdict("met", "twist"))));
        await System.IO.File.WriteAllTextAsync(Path.Combine(Run.Folder, "beside.txt"), "found beside");
        await Run.RunAsync("--set", "toleranceMm=0.25", "--set", "folder=captures/day 2", "--set", "strict=true", "--set", "views=-3");
    }

    public Task DisposeAsync()
    {
        Run.Dispose();
        return Task.CompletedTask;
    }
}
