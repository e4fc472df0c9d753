namespace RiskWorker.Host.UseCases;

/// <summary>How a verb ends, as the process's exit code.</summary>
public enum ExitCode
{
    /// <summary>Done.</summary>
    Done = 0,

    /// <summary>Done, and a limit is breached.</summary>
    Breach = 1,

    /// <summary>Stopped by a blocking finding, or a file of the feed was refused.</summary>
    Blocked = 2,

    /// <summary>The settings or the command line cannot be used.</summary>
    Usage = 3,

    /// <summary>Internal failure, or cancelled.</summary>
    Failure = 4,

    /// <summary>A stored run, its inputs or its files differ from what was recorded.</summary>
    Difference = 5,

    /// <summary>Done, and a limit is undecided at the cap.</summary>
    Undecided = 6,
}
