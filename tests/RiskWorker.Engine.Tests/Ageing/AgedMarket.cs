using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Ageing;

/// <summary>
/// A share S, another T, the dollar and one flat rate R that moves, with a given covariance, and books whose lines have a node each; 27 November 2026
/// is a Friday. The level of a factor at a close inside the horizon is read off a forward that expires on it.
/// </summary>
internal sealed class AgedMarket
{
    public const double S0 = 100, T0 = 50, X0 = 0.9, R0 = 0.02;
    public const double Sigma = 0.02, Tau = 0.03, Xi = 0.006, Rho = 0.0008, Correlation = 0.6;
    public static readonly DateOnly AsOf = new(2026, 11, 27);

    private readonly List<Instrument> _instruments = [];

    public double Volatility { get; init; } = 1;

    public AgeingKind Ageing { get; init; } = AgeingKind.Horizon;

    public double Drift { get; init; }

    public List<Observation> Past { get; init; } = [];

    /// <summary>The date of the close of a day inside a horizon.</summary>
    public static DateOnly Close(int day)
    {
        var date = AsOf;
        while (day > 0)
        {
            date = date.AddDays(1);
            if (date.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)) day--;
        }
        return date;
    }

    public AgedMarket Holding(params Instrument[] instruments)
    {
        _instruments.AddRange(instruments);
        return this;
    }

    /// <summary>Adds what shows the level of a factor at the closes of days: forwards at strike 0.01 without rates.</summary>
    public AgedMarket Showing(string factor, params int[] days)
    {
        foreach (var day in days)
            _instruments.Add(new Forward(new(factor, null), 0.01, Close(day), null, null, null) { Name = Shown(factor, day), Currency = "EUR" });
        return this;
    }

    public Snapshot Snapshot() => new SnapshotBuilder
    {
        AsOf = AsOf,
        Settings = new()
        {
            Model = new() { Covariance = CovarianceEstimator.Given, Ageing = Ageing, Drift = DriftKind.Explicit, Drifts = new Dictionary<string, double> { ["S"] = Drift } },
        },
        Books = [new("ALL", null, "All", "EUR"), .. _instruments.Select(i => new Book(i.Name, "ALL", i.Name, "EUR"))],
        Factors =
        [
            new("S", FactorClass.Equity, ShockKind.Lognormal, "EUR"), new("T", FactorClass.Equity, ShockKind.Lognormal, "EUR"),
            new("U", FactorClass.Equity, ShockKind.Lognormal, "USD"), new("X", FactorClass.Fx, ShockKind.Lognormal, "USD"),
            new("R", FactorClass.Rate, ShockKind.Normal, "EUR", "EUR", 1),
        ],
        Observations = [.. Past, new(AsOf, "S", S0), new(AsOf, "T", T0), new(AsOf, "U", T0), new(AsOf, "X", X0), new(AsOf, "R", R0)],
        Covariance = [.. Covariances()],
        Instruments = _instruments,
        Positions = [.. _instruments.Select(i => new Position(i.Name, i.Name, 1))],
    }.Build();

    public CompiledBook Compile(params int[] horizons) => CompiledBook.Of(Snapshot(), horizons);

    /// <summary>Levels of a factor at the close of a day, scenario by scenario.</summary>
    public static double[] Levels(CompiledBook book, double[][] losses, string factor, int day, int horizon)
    {
        var today = factor switch { "S" => S0, "R" => R0, "X" => X0, _ => T0 };
        return [.. losses[book.RowOf(Shown(factor, day), horizon)].Select(loss => today - loss)];
    }

    private static string Shown(string factor, int day) => $"{factor}@{day:00}";

    private IEnumerable<CovarianceEntry> Covariances()
    {
        (string Name, double Deviation)[] factors = [("R", Rho), ("S", Sigma), ("T", Tau), ("U", Tau), ("X", Xi)];
        for (var i = 0; i < factors.Length; i++)
        {
            for (var j = i; j < factors.Length; j++)
            {
                var correlation = i == j ? 1 : (factors[i].Name, factors[j].Name) is ("S", "T") ? Correlation : 0;
                yield return new(factors[i].Name, factors[j].Name, correlation * Volatility * Volatility * factors[i].Deviation * factors[j].Deviation);
            }
        }
    }
}
