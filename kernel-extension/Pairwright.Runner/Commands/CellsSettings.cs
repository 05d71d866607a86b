using Spectre.Console.Cli;

namespace Pairwright.Runner.Commands;

/// <summary>The command line of the child process.</summary>
internal sealed class CellsSettings : CommandSettings
{
    [CommandArgument(0, "<PIPE>")]
    public string Pipe { get; init; } = "";
}
