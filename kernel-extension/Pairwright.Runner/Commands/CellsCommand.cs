using System.Diagnostics;
using System.IO.Pipes;
using System.Runtime.InteropServices;
using System.Text;
using Pairwright.Runner.Execution;
using Spectre.Console.Cli;

namespace Pairwright.Runner.Commands;

/// <summary>The child process's command, which only this program itself calls: runs the cells of the job that standard input brings.</summary>
internal sealed class CellsCommand : AsyncCommand<CellsSettings>
{
    public override async Task<int> ExecuteAsync(CommandContext context, CellsSettings settings, CancellationToken cancellationToken)
    {
        // Ctrl-C in a terminal reaches parent and child alike; it is the parent's to act on.
        using var onInterrupt = PosixSignalRegistration.Create(PosixSignal.SIGINT, signal => signal.Cancel = true);

        var input = new StreamReader(Console.OpenStandardInput(), new UTF8Encoding(false));
        var job = CellJob.FromLine(await input.ReadLineAsync(CancellationToken.None) ?? "");
        Console.SetIn(TextReader.Null);
        EndWithParent(input);

        await using var pipe = new NamedPipeClientStream(".", settings.Pipe, PipeDirection.Out, PipeOptions.CurrentUserOnly);
        await pipe.ConnectAsync(TimeSpan.FromSeconds(30), CancellationToken.None);
        await using var lines = new StreamWriter(pipe, new UTF8Encoding(false)) { NewLine = "\n" };
        var gate = new Lock();
        await CellHost.RunAsync(job, message =>
        {
            var line = message.ToLine();
            lock (gate)
            {
                lines.WriteLine(line);
                lines.Flush();
            }
        });

        // Threads that a cell left running must not keep the process.
        Environment.Exit(0);
        return 0;
    }

    /// <summary>The parent holds our standard input open as long as it lives; a kernel without a parent has nobody to end it.</summary>
    private static void EndWithParent(StreamReader input) =>
        new Thread(() =>
        {
            while (input.ReadLine() is not null)
            {
            }
            Process.GetCurrentProcess().Kill();
        })
        { IsBackground = true, Name = "parent watch" }.Start();
}
