using MathNet.Numerics.Distributions;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;

namespace RiskWorker.Benchmarks.Quality;

/// <summary>A measure beside its closed form.</summary>
/// <param name="Name">Which.</param>
/// <param name="Exact">The closed form.</param>
/// <param name="Measured">As the engine measured it.</param>
internal sealed record ExactCase(string Name, double Exact, MeasureResult Measured)
{
    /// <summary>Distance in standard errors, from the interval's own half on that side.</summary>
    public double Distance => (Measured.Value - Exact) * 1.959963984540054 / (Exact < Measured.Value ? Measured.Value - Measured.Low!.Value : Measured.High!.Value - Measured.Value);
}

/// <summary>The whole engine on one log-normal position, whose VaR and ES are known exactly.</summary>
internal static class ExactCases
{
    public const int Scenarios = 10_000_000;

    private const decimal Confidence = 0.99m;
    private const double Volatility = 0.2;
    private static readonly DateOnly s_asOf = new(2026, 11, 27);

    public static IEnumerable<ExactCase> Run() => new[] { 1, 10, 252 }.SelectMany(days => new[] { 100.0, -100.0 }.SelectMany(value => OneFactor(value, days)));

    /// <summary>With s = sigma sqrt(h), m = -s²/2: a long position loses V(1 - e^(m + z s)), a short one |V|(e^(m + z s) - 1), z the quantile at either end.</summary>
    private static IEnumerable<ExactCase> OneFactor(double value, int days)
    {
        double tail = (double)(1 - Confidence), deviation = Volatility * Math.Sqrt(days / 252.0), mean = -deviation * deviation / 2;
        var z = Normal.InvCDF(0, 1, tail);
        var end = value > 0 ? z : -z;
        var var = value * (1 - Math.Exp(mean + (end * deviation)));
        // E[e^(m + s Z)] over the tail is e^(m + s²/2) Phi(z - s), or Phi(z + s) at the upper end.
        var es = value * (1 - (Normal.CDF(0, 1, value > 0 ? z - deviation : z + deviation) / tail));
        var measures = Measured(value, days);
        var name = $"{(value > 0 ? "long" : "short")}, {days} days";
        yield return new($"VaR 99%, {name}", var, measures.Single(m => m.Spec.Kind == MeasureKind.Var));
        yield return new($"ES 99%, {name}", es, measures.Single(m => m.Spec.Kind == MeasureKind.Es));
    }

    private static IReadOnlyList<MeasureResult> Measured(double value, int days)
    {
        var snapshot = new Snapshot
        {
            AsOf = s_asOf,
            Settings = new()
            {
                Model = new() { Covariance = CovarianceEstimator.Given },
                Measures = [new(MeasureKind.Var, new(Confidence), new(days)), new(MeasureKind.Es, new(Confidence), new(days))],
                Simulation = new() { Scenarios = Scenarios, Looks = 1, Cap = Scenarios },
            },
            Books = [new("ALL", null, "All", "EUR")],
            Factors = [new("X", FactorClass.Equity, ShockKind.Lognormal, "EUR")],
            Observations = ObservationHistory.From(["X"], [new(s_asOf, "X", 1)]),
            Adjustments = [],
            Holidays = [],
            Instruments = new Dictionary<string, Instrument> { ["UNIT"] = new Spot("X") { Name = "UNIT", Currency = "EUR" } },
            Positions = [new("ALL", "UNIT", value)],
            Limits = [],
            ProfitAndLoss = [],
            Covariance = [new("X", "X", Volatility * Volatility / 252)],
            Hash = SnapshotHash.Of([]),
        };
        return new RunCalculator(snapshot, Environment.ProcessorCount, null, CancellationToken.None).Calculate().Nodes[0].Measures;
    }
}
