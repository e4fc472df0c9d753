namespace RiskWorker.Domain.Runs;

/// <summary>How a run ended.</summary>
public enum RunStatus
{
    /// <summary>Nothing was found.</summary>
    Complete,

    /// <summary>The figures stand, with warnings that travel with them.</summary>
    Degraded,

    /// <summary>A blocking finding stopped it: there are no figures.</summary>
    Failed,
}
