using System.ComponentModel;
using Pairwright.Runner.Execution;
using Spectre.Console.Cli;

namespace Pairwright.Runner.Commands;

/// <summary>The command line of <c>run</c>.</summary>
internal sealed class RunSettings : CommandSettings
{
    [CommandArgument(0, "<NOTEBOOK>")]
    [Description("The notebook to run (.ipynb, C#).")]
    public string Notebook { get; init; } = "";

    [CommandOption("--set <ASSIGNMENT>")]
    [Description("NAME=VALUE: gives a variable of the cell tagged 'parameters' another value; may be given several times.")]
    public string[] Set { get; init; } = [];

    [CommandOption("--out <DIR>")]
    [Description("The folder for the reports.")]
    [DefaultValue("reports")]
    public string Out { get; init; } = "reports";

    [CommandOption("--time-limit <SECONDS>")]
    [Description("Ends the run when it takes longer than this in all.")]
    [DefaultValue((double)RunLimits.DefaultSeconds)]
    public double TimeLimit { get; init; } = RunLimits.DefaultSeconds;

    [CommandOption("--memory-limit <MB>")]
    [Description("Ends the run when it takes more memory than this; three quarters of the machine's unless given.")]
    public int? MemoryLimit { get; init; }
}
