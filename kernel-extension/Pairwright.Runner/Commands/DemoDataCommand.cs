using Spectre.Console.Cli;

namespace Pairwright.Runner.Commands;

/// <summary>Writes the demo captures.</summary>
internal sealed class DemoDataCommand : Command<DemoDataSettings>
{
    public override int Execute(CommandContext context, DemoDataSettings settings, CancellationToken cancellationToken) =>
        throw new BadUsageException("demo-data is not there yet: this build has no simulator.");
}
