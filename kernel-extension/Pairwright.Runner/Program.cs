using Pairwright;
using Pairwright.Runner;
using Pairwright.Runner.Commands;
using Pairwright.Runner.Execution;
using Spectre.Console.Cli;

var app = new CommandApp();
app.Configure(config =>
{
    config.SetApplicationName("pairwright");
    config.SetApplicationVersion(Provenance.Version);
    config.PropagateExceptions();
    config.UseStrictParsing();
    config.AddCommand<RunCommand>("run").WithDescription("Runs a notebook headless and leaves its reports.");
    config.AddCommand<DemoDataCommand>("demo-data").WithDescription("Writes the demo captures of an invented site, with exact truth.");
    config.AddCommand<CellsCommand>(ChildProcess.HiddenCommand).IsHidden();
});

try
{
    if (args.Length == 0)
    {
        await app.RunAsync(["--help"]);
        return ExitCode.BadUsage;
    }
    return await app.RunAsync(args);
}
catch (Exception mistake) when (mistake is BadUsageException or UserErrorException)
{
    Console.Error.WriteLine($"pairwright: {mistake.Message}");
    return ExitCode.BadUsage;
}
catch (CommandAppException mistake)
{
    Console.Error.WriteLine($"pairwright: {mistake.Message.TrimEnd('.')}; see pairwright --help.");
    return ExitCode.BadUsage;
}
