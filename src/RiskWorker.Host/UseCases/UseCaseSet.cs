using RiskWorker.Domain.Market;

namespace RiskWorker.Host.UseCases;

/// <summary>The use cases that verbs and jobs call.</summary>
public sealed record UseCaseSet
{
    /// <summary>Loads the feed into the store.</summary>
    public required UseCase<LoadRequest, LoadReport> Load { get; init; }

    /// <summary>Runs the measure.</summary>
    public required UseCase<MeasureRequest, MeasureReport> Measure { get; init; }

    /// <summary>Makes backtest evidence.</summary>
    public required UseCase<BacktestRequest, BacktestReport> Backtest { get; init; }

    /// <summary>Keeps the explanation of an exception; reports how many there are of it.</summary>
    public required UseCase<ExplainRequest, int> Explain { get; init; }

    /// <summary>Lists stored runs, newest first.</summary>
    public required UseCase<ListRunsRequest, IReadOnlyList<RunSummary>> ListRuns { get; init; }

    /// <summary>Shows one stored run.</summary>
    public required UseCase<ShowRunRequest, ShowRunReport> ShowRun { get; init; }

    /// <summary>Computes a stored run again and holds everything about it against its record.</summary>
    public required UseCase<VerifyRequest, VerifyReport> Verify { get; init; }

    /// <summary>Lists holidays.</summary>
    public required UseCase<HolidaysRequest, IReadOnlyList<Holiday>> Holidays { get; init; }

    /// <summary>Records an interrupted run; reports whether it was recorded.</summary>
    public required UseCase<InterruptedRun, bool> RecordInterrupted { get; init; }
}
