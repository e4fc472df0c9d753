using Microsoft.Extensions.Hosting;

namespace RiskWorker.Host.Jobs;

/// <summary>Leaves signals to the verb that started the service: the host stops when that verb's token is cancelled, and for nothing else.</summary>
public sealed class CallerLifetime : IHostLifetime
{
    /// <inheritdoc/>
    public Task WaitForStartAsync(CancellationToken cancellationToken) => Task.CompletedTask;

    /// <inheritdoc/>
    public Task StopAsync(CancellationToken cancellationToken) => Task.CompletedTask;
}
