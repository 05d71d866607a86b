// A notebook host that knows nothing of this library: it must come by package or by path, as into Jupyter's kernel.
//
//   NotebookHost CELLS.json      a list of cells' sources; prints what each of them left, as a list in JSON

using System.Reactive.Linq;
using System.Text.Json;
using Microsoft.DotNet.Interactive;
using Microsoft.DotNet.Interactive.Commands;
using Microsoft.DotNet.Interactive.CSharp;
using Microsoft.DotNet.Interactive.Events;
using Microsoft.DotNet.Interactive.Formatting;
using Microsoft.DotNet.Interactive.PackageManagement;

Formatter.DefaultMimeType = HtmlFormatter.MimeType;
Formatter.SetPreferredMimeTypesFor(typeof(string), PlainTextFormatter.MimeType);

var scripts = new Queue<string>();
var csharp = new CSharpKernel().UseNugetDirective(AddPackages).UseKernelHelpers().UseValueSharing();
using var kernel = new CompositeKernel { csharp };
kernel.DefaultKernelName = csharp.Name;

var cells = JsonSerializer.Deserialize<string[]>(File.ReadAllText(args[0]))!;
var left = new List<Dictionary<string, string>>();
foreach (var cell in cells)
{
    left.Add(await RunAsync(cell));
    while (scripts.TryDequeue(out var script))
    {
        await kernel.LoadAndRunInteractiveDocument(new FileInfo(script));
    }
}

// Not before: what a host writes to the console while a cell runs becomes the cell's.
Console.WriteLine(JsonSerializer.Serialize(left));

// A package says in this folder what is to be run when it has been added.
Task AddPackages(CSharpKernel target, IReadOnlyList<ResolvedPackageReference> packages)
{
    target.AddAssemblyReferences(packages.SelectMany(package => package.AssemblyPaths));
    foreach (var script in packages.Select(package => Path.Combine(package.PackageRoot, "interactive-extensions", "dotnet", "extension.dib")).Where(File.Exists))
    {
        scripts.Enqueue(script);
    }
    return Task.CompletedTask;
}

async Task<Dictionary<string, string>> RunAsync(string code)
{
    var outputs = new Dictionary<string, string>();
    var result = await kernel.SendAsync(new SubmitCode(code));
    foreach (var happened in result.Events)
    {
        switch (happened)
        {
            case CommandFailed failed:
                outputs["error"] = failed.Message;
                break;
            case ReturnValueProduced returned:
                foreach (var value in returned.FormattedValues)
                {
                    outputs[value.MimeType] = value.Value;
                }
                break;
        }
    }
    return outputs;
}
