using Microsoft.Extensions.Hosting;

namespace RiskWorker.Host.Jobs;

/// <summary>The time that a run has to end once the service is told to stop; then its token is cancelled.</summary>
public sealed class StopGrace : IDisposable
{
    private readonly CancellationTokenSource _cut;
    private readonly IHostApplicationLifetime _lifetime;
    private readonly CancellationTokenRegistration _stopping;

    /// <summary>Starts counting <paramref name="length"/> when the service begins to stop.</summary>
    public StopGrace(IHostApplicationLifetime lifetime, TimeProvider clock, TimeSpan length)
    {
        _lifetime = lifetime;
        _cut = new(Timeout.InfiniteTimeSpan, clock);
        _stopping = lifetime.ApplicationStopping.Register(() => _cut.CancelAfter(length));
    }

    /// <summary>Whether the service is stopping, so that no run should begin.</summary>
    public bool HasBegun => _lifetime.ApplicationStopping.IsCancellationRequested;

    /// <summary>Cancelled when the time is over.</summary>
    public CancellationToken Over => _cut.Token;

    /// <inheritdoc/>
    public void Dispose()
    {
        _stopping.Dispose();
        _cut.Dispose();
    }
}
