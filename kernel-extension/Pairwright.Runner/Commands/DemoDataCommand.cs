using Pairwright.Simulation;
using Spectre.Console;
using Spectre.Console.Cli;

namespace Pairwright.Runner.Commands;

/// <summary>Writes the demo captures.</summary>
internal sealed class DemoDataCommand(IAnsiConsole console) : AsyncCommand<DemoDataSettings>
{
    public override async Task<int> ExecuteAsync(CommandContext context, DemoDataSettings settings, CancellationToken cancellationToken)
    {
        using var interruption = new Interruption();
        try
        {
            await console.Progress().StartAsync(async view =>
            {
                var task = view.AddTask("captures of Tarn Hollow", maxValue: 1);
                await Task.Run(() => DemoData.Write(settings.Folder, new Share(task), interruption.Token), CancellationToken.None);
            });
        }
        catch (OperationCanceledException)
        {
            console.WriteLine($"Stopped; what was written to {settings.Folder} is whole, but not all of the demo: run the command again.");
            return ExitCode.Interrupted;
        }

        console.WriteLine($"The demo is in {settings.Folder}; its README.md tells what is what.");
        return ExitCode.AllMet;
    }

    // Reports on the calling thread: Progress<T> would post it to a thread pool and let the last step come after the end.
    private sealed class Share(ProgressTask task) : IProgress<double>
    {
        public void Report(double value) => task.Value = value;
    }
}
