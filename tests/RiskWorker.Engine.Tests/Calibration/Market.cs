using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests.Calibration;

/// <summary>A small market under construction; <see cref="Snapshot"/> freezes it.</summary>
internal sealed class Market
{
    public static readonly DateOnly Monday = new(2024, 1, 1);

    public List<Factor> Factors { get; } = [];

    public List<Observation> Observations { get; } = [];

    public List<Adjustment> Adjustments { get; } = [];

    public List<Holiday> Holidays { get; } = [];

    public List<CovarianceEntry> Covariance { get; } = [];

    public ModelSettings Model { get; set; } = new() { Covariance = CovarianceEstimator.Equal };

    /// <summary>The i-th Monday to Friday from Monday, 1 January 2024, counted from 0.</summary>
    public static DateOnly Day(int i) => Monday.AddDays((i / 5 * 7) + (i % 5));

    /// <summary>Adds a lognormal equity with a value a weekday from <paramref name="first"/> on; NaN leaves a day out.</summary>
    public Market Equity(string name, IEnumerable<double> values, int first = 0, string? calendar = null, string? proxy = null, double? beta = null) =>
        Add(new(name, FactorClass.Equity, ShockKind.Lognormal, Calendar: calendar, Proxy: proxy, Beta: beta), values, first);

    /// <summary>Adds a rate with normal shocks.</summary>
    public Market Rate(string name, IEnumerable<double> values, int first = 0) =>
        Add(new(name, FactorClass.Rate, ShockKind.Normal), values, first);

    public Market Add(Factor factor, IEnumerable<double> values, int first = 0)
    {
        Factors.Add(factor);
        foreach (var (i, value) in values.Index())
        {
            if (!double.IsNaN(value)) Observations.Add(new(Day(first + i), factor.Name, value));
        }
        return this;
    }

    public Market Given(string factor, string other, double value)
    {
        Covariance.Add(new(factor, other, value));
        return this;
    }

    public Snapshot Snapshot(DateOnly? asOf = null) => new()
    {
        AsOf = asOf ?? Observations.Max(o => o.Date),
        Settings = new() { Model = Model },
        Books = [],
        Factors = [.. Factors.OrderBy(f => f.Name, StringComparer.Ordinal)],
        Observations = ObservationHistory.From(Factors.Select(f => f.Name), Observations),
        Adjustments = Adjustments,
        Holidays = Holidays,
        Instruments = new Dictionary<string, Domain.Instruments.Instrument>(),
        Positions = [],
        Limits = [],
        ProfitAndLoss = [],
        Covariance = Covariance,
        Hash = SnapshotHash.Of([]),
    };

    /// <summary>Prices that start at 100 and move by uniform shocks of ±2%, without a function that differs by hardware.</summary>
    public static double[] Prices(int count, int seed)
    {
        var random = new Random(seed);
        var prices = new double[count];
        prices[0] = 100;
        for (var i = 1; i < count; i++) prices[i] = prices[i - 1] * (1 + (0.04 * (random.NextDouble() - 0.5)));
        return prices;
    }
}
