using System.Runtime.InteropServices;

namespace CloudStruct.Runs;

/// <summary>Ctrl-C and SIGTERM as a token: the run stops at the next check, cleans up, and ends with 130.</summary>
internal sealed class Interrupts : IDisposable
{
    private readonly CancellationTokenSource source = new();
    private readonly PosixSignalRegistration[] registrations;

    /// <summary>Listens from now on.</summary>
    public Interrupts() => registrations =
    [
        PosixSignalRegistration.Create(PosixSignal.SIGINT, Stop),
        PosixSignalRegistration.Create(PosixSignal.SIGTERM, Stop),
    ];

    /// <summary>Cancelled by the first signal.</summary>
    public CancellationToken Token => source.Token;

    /// <inheritdoc/>
    public void Dispose()
    {
        foreach (PosixSignalRegistration r in registrations) r.Dispose();
        source.Dispose();
    }

    private void Stop(PosixSignalContext context)
    {
        context.Cancel = true;   // the default action would kill the process before it has cleaned up
        source.Cancel();
    }
}
