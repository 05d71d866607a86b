using System.Runtime.InteropServices;

namespace Pairwright.Runner.Commands;

/// <summary>Turns Ctrl-C, and a polite request to end, into a cancelled token as long as it lives, so that a command can leave things in order.</summary>
internal sealed class Interruption : IDisposable
{
    private readonly CancellationTokenSource _source = new();
    private readonly PosixSignalRegistration[] _signals;

    public Interruption() =>
        _signals =
        [
            PosixSignalRegistration.Create(PosixSignal.SIGINT, Interrupt),
            PosixSignalRegistration.Create(PosixSignal.SIGTERM, Interrupt),
        ];

    public CancellationToken Token => _source.Token;

    public void Dispose()
    {
        foreach (var signal in _signals)
        {
            signal.Dispose();
        }
        _source.Dispose();
    }

    private void Interrupt(PosixSignalContext signal)
    {
        signal.Cancel = true;
        _source.Cancel();
    }
}
