using System.Reactive.Linq;
using System.Reflection;
using System.Text;
using System.Text.RegularExpressions;
using Microsoft.CodeAnalysis.Scripting;
using Microsoft.DotNet.Interactive;
using Microsoft.DotNet.Interactive.Commands;
using Microsoft.DotNet.Interactive.CSharp;
using Microsoft.DotNet.Interactive.Events;
using Microsoft.DotNet.Interactive.Formatting;
using Microsoft.DotNet.Interactive.PackageManagement;
using Pairwright.Notebook;

namespace Pairwright.Runner.Execution;

/// <summary>The child process's part: a C# kernel that runs the cells of a job and tells what happens, line by line.</summary>
internal sealed partial class CellHost : IDisposable
{
    private readonly Action<ChildMessage> _tell;
    private readonly CompositeKernel _kernel;
    private int _cell = -1;

    private CellHost(Action<ChildMessage> tell, CompositeKernel kernel)
    {
        _tell = tell;
        _kernel = kernel;
    }

    public static async Task RunAsync(CellJob job, Action<ChildMessage> tell)
    {
        Directory.SetCurrentDirectory(job.Folder);
        using var host = await StartAsync(tell);
        tell(new ChildMessage { Kind = ChildMessageKind.Ready });
        for (var place = 0; place < job.Cells.Count; place++)
        {
            if (!await host.RunCellAsync(place, job.Cells[place]))
            {
                return;
            }
        }
        tell(new ChildMessage { Kind = ChildMessageKind.Finished });
    }

    public void Dispose() => _kernel.Dispose();

    private static async Task<CellHost> StartAsync(Action<ChildMessage> tell)
    {
        // As Jupyter's kernel for C# does it: rich values as HTML, strings as they are.
        Formatter.DefaultMimeType = HtmlFormatter.MimeType;
        Formatter.SetPreferredMimeTypesFor(typeof(string), PlainTextFormatter.MimeType);

        var csharp = new CSharpKernel()
            .UseNugetDirective(AddPackage)
            .UseKernelHelpers()
            .UseValueSharing()
            .UseWho();
        TracePlaces(csharp);
        // Referenced here, and not by the notebook: then every cell sees the same types, however it asks for them.
        csharp.AddAssemblyReferences([typeof(VerdictRecord).Assembly.Location, typeof(Extension).Assembly.Location]);

        var kernel = new CompositeKernel { csharp };
        kernel.DefaultKernelName = csharp.Name;

        var host = new CellHost(tell, kernel);
        await Extension.Load(kernel);
        VerdictLedger.Recorded += verdict => tell(new ChildMessage { Kind = ChildMessageKind.Verdict, Cell = host._cell, Verdict = verdict });
        kernel.KernelEvents.Subscribe(host.Hear);
        return host;
    }

    private static Task AddPackage(CSharpKernel kernel, IReadOnlyList<ResolvedPackageReference> packages)
    {
        kernel.AddAssemblyReferences(packages.SelectMany(package => package.AssemblyPaths));
        return Task.CompletedTask;
    }

    /// <summary>Lets run-time errors say their cell and line.</summary>
    /// <remarks>
    /// Implementation note: the kernel keeps its script options to itself and compiles without places, hence the reflection.
    /// Where a later version has no such field, errors come without lines and nothing else is lost.
    /// </remarks>
    private static void TracePlaces(CSharpKernel kernel)
    {
        var field = typeof(CSharpKernel).GetField("_scriptOptions", BindingFlags.Instance | BindingFlags.NonPublic);
        if (field?.GetValue(kernel) is ScriptOptions options)
        {
            field.SetValue(kernel, options.WithEmitDebugInformation(true).WithFileEncoding(Encoding.UTF8).WithFilePath("cells"));
        }
    }

    private async Task<bool> RunCellAsync(int place, JobCell cell)
    {
        _cell = place;
        _tell(new ChildMessage { Kind = ChildMessageKind.CellStarted, Cell = place });

        var result = await _kernel.SendAsync(new SubmitCode(CellSource.Prepare(cell)));
        var failed = result.Events.OfType<CommandFailed>().LastOrDefault();
        if (failed is null)
        {
            _tell(new ChildMessage { Kind = ChildMessageKind.CellFinished, Cell = place });
            return true;
        }

        _tell(new ChildMessage { Kind = ChildMessageKind.CellFailed, Cell = place, Failure = FailureOf(failed) });
        return false;
    }

    private void Hear(KernelEvent happened)
    {
        switch (happened)
        {
            case DisplayedValueProduced shown:
                Show(ChildMessageKind.Display, shown);
                break;
            case DisplayedValueUpdated changed:
                Show(ChildMessageKind.Update, changed);
                break;
            case ReturnValueProduced { Value: not DisplayedValue } returned:
                Show(ChildMessageKind.Result, returned);
                break;
            case StandardOutputValueProduced text:
                Stream("stdout", text);
                break;
            case StandardErrorValueProduced text:
                Stream("stderr", text);
                break;
        }
    }

    private void Stream(string name, DisplayEvent text) => _tell(new ChildMessage
    {
        Kind = ChildMessageKind.Stream,
        Cell = _cell,
        Stream = name,
        Text = string.Concat(text.FormattedValues.Take(1).Select(value => value.Value)),
    });

    private void Show(ChildMessageKind kind, DisplayEvent shown)
    {
        var data = new Dictionary<string, string>(StringComparer.Ordinal);
        foreach (var value in shown.FormattedValues)
        {
            data.TryAdd(value.MimeType, value.Value);
        }
        _tell(new ChildMessage { Kind = kind, Cell = _cell, ValueId = shown.ValueId, Data = data });
    }

    private static CellFailure FailureOf(CommandFailed failed)
    {
        var thrown = Innermost(failed.Exception);
        if (thrown is CodeSubmissionCompilationErrorException or null)
        {
            return NotCompiled(failed.Message);
        }

        var trace = PlacesIn(thrown);
        var kind = thrown switch
        {
            UserErrorException => CellFailureKind.UserError,
            OutOfMemoryException => CellFailureKind.OutOfMemory,
            _ => CellFailureKind.Thrown,
        };
        return new CellFailure(
            kind,
            thrown.GetType().Name,
            thrown.Message,
            trace.Select(LineIn).FirstOrDefault(line => line is not null),
            kind == CellFailureKind.UserError ? [] : trace);
    }

    /// <summary>Takes off the wrappings that only say that something below failed.</summary>
    private static Exception? Innermost(Exception? thrown) => thrown switch
    {
        AggregateException { InnerExceptions.Count: 1, InnerException: { } inner } => Innermost(inner),
        TargetInvocationException { InnerException: { } inner } => Innermost(inner),
        TypeInitializationException { InnerException: { } inner } => Innermost(inner),
        _ => thrown,
    };

    private static CellFailure NotCompiled(string message)
    {
        var first = message.Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries).FirstOrDefault() ?? "the code does not compile";
        var error = CompilerLine().Match(first);
        return error.Success
            ? new CellFailure(CellFailureKind.NotCompiled, error.Groups["code"].Value, error.Groups["text"].Value, LineIn(first), [message])
            : new CellFailure(CellFailureKind.NotCompiled, "error", first, LineIn(first), [message]);
    }

    private static List<string> PlacesIn(Exception thrown)
    {
        var places = new List<string>();
        foreach (var frame in (thrown.StackTrace ?? "").Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries))
        {
            if (frame.Contains("Microsoft.CodeAnalysis.Scripting", StringComparison.Ordinal)
                || frame.Contains("Microsoft.DotNet.Interactive", StringComparison.Ordinal)
                || frame.StartsWith("---", StringComparison.Ordinal))
            {
                continue;
            }
            var inCell = CellPlace().Match(frame);
            places.Add(inCell.Success ? $"{inCell.Groups["cell"].Value}: line {inCell.Groups["line"].Value}" : frame);
        }
        return places;
    }

    private static int? LineIn(string text)
    {
        var place = AnyPlace().Match(text);
        return place.Success ? int.Parse(place.Groups["line"].Value) : null;
    }

    [GeneratedRegex(@"(?<cell>cell\[\w+\]):line (?<line>\d+)")]
    private static partial Regex CellPlace();

    [GeneratedRegex(@"cell\[\w+\](: ?line |\()(?<line>\d+)")]
    private static partial Regex AnyPlace();

    [GeneratedRegex(@"error (?<code>CS\d+): (?<text>.*)$")]
    private static partial Regex CompilerLine();
}
