using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Jobs;

/// <summary>What the service is to do.</summary>
public sealed record ServiceRequest
{
    /// <summary>Where it works.</summary>
    public required Workspace Workspace { get; init; }

    /// <summary>Settings with at least one schedule.</summary>
    public required Configuration Configuration { get; init; }

    /// <summary>How long a stop waits for the run that is on before it is cut short.</summary>
    public required TimeSpan StopTimeout { get; init; }

    /// <summary>Whether to log in detail.</summary>
    public bool IsVerbose { get; init; }
}
