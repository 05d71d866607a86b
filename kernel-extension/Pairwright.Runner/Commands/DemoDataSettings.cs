using System.ComponentModel;
using Spectre.Console.Cli;

namespace Pairwright.Runner.Commands;

/// <summary>The command line of <c>demo-data</c>.</summary>
internal sealed class DemoDataSettings : CommandSettings
{
    [CommandArgument(0, "<DIR>")]
    [Description("The folder to write to; it is made when it is missing.")]
    public string Folder { get; init; } = "";
}
