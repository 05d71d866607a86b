using Pairwright;
using Pairwright.Runner;
using Pairwright.Runner.Commands;
using Pairwright.Runner.Execution;
using Spectre.Console.Cli;

string[] names = ["run", "match", "demo-data"];
var app = new CommandApp();
app.Configure(config =>
{
    config.SetApplicationName("pairwright");
    config.SetApplicationVersion(Provenance.Version);
    config.SetHelpProvider(new HelpText(config.Settings));
    config.PropagateExceptions();
    config.UseStrictParsing();
    config.AddCommand<RunCommand>(names[0]).WithDescription("Runs a notebook headless and leaves its reports.")
        .WithExample("run", "notebooks/commission-rig.ipynb")
        .WithExample("run", "notebooks/commission-rig.ipynb", "--set", "toleranceMm=2");
    config.AddCommand<MatchCommand>(names[1]).WithDescription("Matches one pair, or all pairs that fit a pattern, and writes their maps.")
        .WithExample("match", "left.png", "right.png", "--range", "0:127", "--out", "map.pfm")
        .WithExample("match", "'day/left_*.png'", "'day/right_*.png'", "--rig", "rig.yaml", "--depths", "900:1300", "--out", "'day/*.pfm'");
    config.AddCommand<DemoDataCommand>(names[2]).WithDescription("Writes the demo captures of an invented site, with exact truth.");
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
    Console.Error.WriteLine($"pairwright: {mistake.Message.TrimEnd('.')}; see pairwright {(names.Contains(args[0]) ? args[0] + " " : "")}--help.");
    return ExitCode.BadUsage;
}
