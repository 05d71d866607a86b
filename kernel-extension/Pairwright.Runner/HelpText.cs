using Spectre.Console;
using Spectre.Console.Cli;
using Spectre.Console.Cli.Help;
using Spectre.Console.Rendering;

namespace Pairwright.Runner;

/// <summary>The help of the command line: the library's own, and what the exit codes say.</summary>
internal sealed class HelpText(ICommandAppSettings settings) : HelpProvider(settings)
{
    public override IEnumerable<IRenderable> GetFooter(ICommandModel model, ICommandInfo? command) =>
        command is null or { Name: "run" } ? [new Text(Codes)] : [];

    private static string Codes =>
        $"""

        EXIT CODES OF RUN:
            {ExitCode.AllMet,2}  all requirements are met, or none was stated
            {ExitCode.NotAllMet,2}  a requirement is not met or undecided
            {ExitCode.Stopped,2}  a cell failed, or the run ended early for want of time or memory
            {ExitCode.BadUsage,2}  the command line or the notebook file makes no sense
            70  the launcher could not build or install what is needed

        """;
}
