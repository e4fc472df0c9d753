using System.Runtime.InteropServices;

namespace RiskWorker.Host.Verbs;

/// <summary>
/// Turns Ctrl-C and the termination signal into a cancelled token, so that work ends at a clean point.
/// A second signal is left to the system and ends the process at once.
/// </summary>
public sealed class Interruption : IDisposable
{
    private readonly CancellationTokenSource _source = new();
    private readonly PosixSignalRegistration[] _signals;

    /// <summary>Listens from now on.</summary>
    public Interruption() => _signals = [PosixSignalRegistration.Create(PosixSignal.SIGINT, Handle), PosixSignalRegistration.Create(PosixSignal.SIGTERM, Handle)];

    /// <summary>Cancelled at the first signal.</summary>
    public CancellationToken Token => _source.Token;

    /// <summary>Stops listening.</summary>
    public void Dispose()
    {
        foreach (var signal in _signals) signal.Dispose();
        _source.Dispose();
    }

    private void Handle(PosixSignalContext signal)
    {
        if (_source.IsCancellationRequested) return;
        signal.Cancel = true;
        _source.Cancel();
    }
}
