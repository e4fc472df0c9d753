using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;

namespace RiskWorker.Engine.Tests.Runs;

/// <summary>One unit of each of a few independent factors with normal shocks: every loss is normal, so measures have closed forms.</summary>
internal sealed record NormalBook(params Factor[] Factors)
{
    public static readonly DateOnly AsOf = new(2026, 11, 27);

    /// <summary>Standard deviation of a day's shock, by factor.</summary>
    public required double[] Deviations { get; init; }

    public RunSettings Settings { get; init; } = new();

    public Snapshot Snapshot() => new SnapshotBuilder
    {
        AsOf = AsOf,
        Settings = Settings with { Model = Settings.Model with { Covariance = CovarianceEstimator.Given } },
        Books = [new("ALL", null, "All", "EUR")],
        Factors = [.. Factors],
        Observations = [.. Factors.Select(f => new Observation(AsOf, f.Name, 1000))],
        Instruments = [.. Factors.Select(f => new Spot(f.Name) { Name = f.Name + "-UNIT", Currency = "EUR" })],
        Positions = [.. Factors.Select(f => new Position("ALL", f.Name + "-UNIT", 1))],
        Covariance = [.. Enumerable.Range(0, Factors.Length).SelectMany(i => Enumerable.Range(i, Factors.Length - i)
            .Select(j => new CovarianceEntry(Factors[i].Name, Factors[j].Name, i == j ? Deviations[i] * Deviations[i] : 0)))],
    }.Build();

    public RunResults Results() => new RunCalculator(Snapshot(), 2, null, CancellationToken.None).Calculate();

    public static Factor Normal(string name, FactorClass kind = FactorClass.Commodity, int? liquidityDays = null) => new(name, kind, ShockKind.Normal, "EUR", LiquidityDays: liquidityDays);
}
