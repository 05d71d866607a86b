using System.Runtime.CompilerServices;
using System.Text.RegularExpressions;
using Microsoft.CodeAnalysis;
using Microsoft.CodeAnalysis.CSharp.Scripting;
using Microsoft.CodeAnalysis.Scripting;
using Microsoft.DotNet.Interactive.Formatting;
using Xunit;

namespace Pairwright.Notebook.Tests;

public partial class ReadmeTests
{
    [Fact]
    public void The_readmes_code_compiles_cell_after_cell_with_no_using_but_the_extensions()
    {
        // Formatting's namespace is what the kernel itself opens for Display().
        var options = ScriptOptions.Default
            .AddReferences(typeof(VerdictRecord).Assembly, typeof(Extension).Assembly, typeof(Formatter).Assembly)
            .AddReferences(typeof(Microsoft.DotNet.Interactive.Kernel).Assembly)
            .AddImports("System", "System.Linq", "System.Collections.Generic", "Microsoft.DotNet.Interactive", "Microsoft.DotNet.Interactive.Formatting");
        var cells = Cells().Matches(File.ReadAllText(Path.Combine(Root(), "README.md"))).Select(match => match.Groups["code"].Value).ToArray();
        Assert.True(cells.Length >= 5);

        var namespaces = typeof(VerdictRecord).Assembly.GetExportedTypes().Select(type => type.Namespace).Append(typeof(PairDrawings).Namespace).OfType<string>().Distinct();
        Script<object> script = CSharpScript.Create(string.Join('\n', namespaces.Select(name => $"using {name};")), options);
        foreach (var cell in cells)
        {
            script = script.ContinueWith(cell);
            var faults = script.Compile().Where(diagnostic => diagnostic.Severity == DiagnosticSeverity.Error).Select(diagnostic => diagnostic.ToString()).ToArray();
            Assert.True(faults.Length == 0, $"{cell}\n{string.Join('\n', faults)}");
        }
    }

    [Fact]
    public void The_files_that_the_readme_names_are_there()
    {
        var text = File.ReadAllText(Path.Combine(Root(), "README.md"));
        Assert.All(Links().Matches(text), link => Assert.True(File.Exists(Path.Combine(Root(), link.Groups["path"].Value)), link.Value));
    }

    private static string Root([CallerFilePath] string path = "") => Path.GetFullPath(Path.Combine(Path.GetDirectoryName(path)!, "..", ".."));

    [GeneratedRegex("```csharp\n(?<code>.*?)```", RegexOptions.Singleline)]
    private static partial Regex Cells();

    [GeneratedRegex(@"\]\((?<path>[^)#:]+)\)")]
    private static partial Regex Links();
}
