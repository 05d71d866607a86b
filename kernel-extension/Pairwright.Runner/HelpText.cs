using Spectre.Console;
using Spectre.Console.Cli;
using Spectre.Console.Cli.Help;
using Spectre.Console.Rendering;

namespace Pairwright.Runner;

/// <summary>The help of the command line: the library's own, and what the exit codes say.</summary>
internal sealed class HelpText(ICommandAppSettings settings) : HelpProvider(settings)
{
    public override IEnumerable<IRenderable> GetFooter(ICommandModel model, ICommandInfo? command) =>
        command?.Name switch
        {
            null => [new Text(RunCodes), new Text(MatchCodes)],
            "run" => [new Text(RunCodes)],
            "match" => [new Text(MatchCodes)],
            _ => [],
        };

    private static string RunCodes =>
        $"""

        EXIT CODES OF RUN:
            {ExitCode.AllMet,4}  all requirements are met, or none was stated
            {ExitCode.NotAllMet,4}  a requirement is not met or undecided
            {ExitCode.Stopped,4}  a cell failed, or the run ended early for want of time or memory
            {ExitCode.BadUsage,4}  the command line or the notebook file makes no sense
              70  the launcher could not build or install what is needed

        """;

    private static string MatchCodes =>
        $"""

        EXIT CODES OF MATCH:
            {ExitCode.AllMet,4}  all pairs are matched
            {ExitCode.Stopped,4}  a pair could not be matched; the others are
            {ExitCode.BadUsage,4}  the command line or a file makes no sense
            {ExitCode.Interrupted,4}  stopped; run the same command again to go on

        """;
}
