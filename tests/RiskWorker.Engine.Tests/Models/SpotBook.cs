using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>Spot positions in factors at 1 with a given covariance, under any model: VaR 99% and ES 97.5% at one horizon.</summary>
/// <param name="Model">The model; a covariance that is given unless it says otherwise.</param>
/// <param name="Days">The horizon.</param>
internal sealed record SpotBook(ModelSettings Model, int Days)
{
    public static readonly DateOnly AsOf = new(2026, 11, 27);

    /// <summary>Yearly volatility of each factor X, Y, ...</summary>
    public double[] Volatilities { get; init; } = [0.25];

    /// <summary>Value held of each; negative is short.</summary>
    public double[] Values { get; init; } = [1_000_000];

    /// <summary>Correlation of every pair.</summary>
    public double Correlation { get; init; }

    /// <summary>How they move.</summary>
    public ShockKind Shock { get; init; } = ShockKind.Lognormal;

    public int Scenarios { get; init; } = 200_000;

    public IReadOnlyList<MeasureSpec> Measures => [new(MeasureKind.Var, new(0.99m), new(Days)), new(MeasureKind.Es, new(0.975m), new(Days))];

    public Snapshot Snapshot() => new SnapshotBuilder
    {
        AsOf = AsOf,
        Settings = new()
        {
            Model = Model with { Covariance = CovarianceEstimator.Given },
            Measures = Measures,
            Simulation = new() { Scenarios = Scenarios, Seed = 20_261_127 },
        },
        Factors = [.. Volatilities.Select((_, j) => new Factor(Name(j), Shock == ShockKind.Normal ? FactorClass.Rate : FactorClass.Equity, Shock, "EUR"))],
        Observations = [.. Volatilities.Select((_, j) => new Observation(AsOf, Name(j), 1))],
        Covariance =
        [
            .. from i in Enumerable.Range(0, Volatilities.Length)
               from j in Enumerable.Range(0, i + 1)
               select new CovarianceEntry(Name(i), Name(j), (i == j ? 1 : Correlation) * Volatilities[i] * Volatilities[j] / 252),
        ],
        Instruments = [.. Volatilities.Select((_, j) => Shock == ShockKind.Normal ? (Instrument)new Future(Name(j)) { Name = Name(j) + "-UNIT", Currency = "EUR" } : new Spot(Name(j)) { Name = Name(j) + "-UNIT", Currency = "EUR" })],
        Positions = [.. Values.Select((value, j) => new Domain.Books.Position("ALL", Name(j) + "-UNIT", value))],
    }.Build();

    /// <summary>The measures of the whole run.</summary>
    public (MeasureResult Var, MeasureResult Es) Measured()
    {
        var results = new RunCalculator(Snapshot(), 2, null, CancellationToken.None).Calculate();
        var measures = Assert.Single(results.Nodes).Measures;
        return (measures.Single(m => m.Spec.Kind == MeasureKind.Var), measures.Single(m => m.Spec.Kind == MeasureKind.Es));
    }

    private static string Name(int factor) => ((char)('X' + factor)).ToString();
}
