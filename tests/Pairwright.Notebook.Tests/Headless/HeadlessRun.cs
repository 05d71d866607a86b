using System.Diagnostics;
using System.Text.Json.Nodes;
using System.Xml.Linq;
using Pairwright.Runner.Documents;

namespace Pairwright.Notebook.Tests.Headless;

/// <summary>Runs the real command line in a process of its own on a notebook in a fresh folder, and keeps what it left.</summary>
internal sealed class HeadlessRun : IDisposable
{
    private HeadlessRun(string folder) => Folder = folder;

    public string Folder { get; }

    public int ExitCode { get; private set; }

    public string Output { get; private set; } = "";

    public string Errors { get; private set; } = "";

    public string NotebookPath => Path.Combine(Folder, "tiny.ipynb");

    public string ReportPath(string ending) => Path.Combine(Folder, "reports", $"tiny.{ending}");

    public string Page => File.ReadAllText(ReportPath("html"));

    public JsonNode Notebook => JsonNode.Parse(File.ReadAllText(ReportPath("ipynb")))!;

    public JsonNode Verdicts => JsonNode.Parse(File.ReadAllText(ReportPath("verdicts.json")))!;

    public XElement Suite => XDocument.Load(ReportPath("junit.xml")).Root!.Element("testsuite")!;

    public string Summary => Verdicts["summary"]!.GetValue<string>();

    /// <summary>What a code cell left, by the number that the reports give it: from 1, injected cells not counted.</summary>
    public JsonArray OutputsOf(int number) =>
        Notebook["cells"]!.AsArray()
            .Select(cell => new NotebookCell(cell!.AsObject()))
            .Where(cell => cell.IsCode && !cell.IsInjected)
            .ElementAt(number - 1)
            .Outputs;

    public static async Task<HeadlessRun> Of(JsonObject notebook, params string[] options)
    {
        var run = In(notebook);
        await run.RunAsync(options);
        return run;
    }

    /// <summary>A fresh folder.</summary>
    public static HeadlessRun Empty() => new(Directory.CreateTempSubdirectory("pairwright-test-").FullName);

    /// <summary>A fresh folder with a notebook in it, not yet run.</summary>
    public static HeadlessRun In(JsonObject notebook)
    {
        var run = Empty();
        File.WriteAllText(run.NotebookPath, notebook.ToJsonString());
        return run;
    }

    /// <summary>Runs the notebook of this folder.</summary>
    public Task RunAsync(params string[] options) =>
        CommandAsync(["run", NotebookPath, "--out", Path.Combine(Folder, "reports"), .. options]);

    /// <summary>Any command line.</summary>
    public static async Task<HeadlessRun> Command(params string[] arguments)
    {
        var run = Empty();
        await run.CommandAsync(arguments);
        return run;
    }

    public Process Start(params string[] arguments)
    {
        var start = new ProcessStartInfo("dotnet")
        {
            WorkingDirectory = Folder,
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        start.ArgumentList.Add(Path.Combine(AppContext.BaseDirectory, "Pairwright.Runner.dll"));
        foreach (var argument in arguments)
        {
            start.ArgumentList.Add(argument);
        }
        // A kernel of a few seconds' life earns nothing from watching itself for a better compilation.
        start.Environment["DOTNET_TieredPGO"] = "0";
        return Process.Start(start)!;
    }

    public async Task CommandAsync(params string[] arguments)
    {
        using var process = Start(arguments);
        await Finish(process);
    }

    public async Task Finish(Process process)
    {
        var output = process.StandardOutput.ReadToEndAsync();
        var errors = process.StandardError.ReadToEndAsync();
        await process.WaitForExitAsync();
        Output = await output;
        Errors = await errors;
        ExitCode = process.ExitCode;
    }

    public void Dispose() => Directory.Delete(Folder, recursive: true);
}
