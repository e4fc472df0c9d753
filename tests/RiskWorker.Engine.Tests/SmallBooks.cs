using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests;

/// <summary>Small books with a given covariance, for tests that need a plan and nothing else.</summary>
internal static class SmallBooks
{
    /// <summary>One lognormal factor at 1 with the given daily deviation, and one position in it.</summary>
    public static Snapshot OneFactor(double deviation, double quantity) => new SnapshotBuilder
    {
        Settings = new() { Model = new() { Covariance = CovarianceEstimator.Given } },
        Factors = [new("X", FactorClass.Equity, ShockKind.Lognormal, "EUR")],
        Observations = [new(new(2026, 11, 27), "X", 1)],
        Covariance = [new("X", "X", deviation * deviation)],
        Instruments = [new Spot("X") { Name = "X-UNIT", Currency = "EUR" }],
        Positions = [new("ALL", "X-UNIT", quantity)],
    }.Build();
}
