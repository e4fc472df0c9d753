using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Calibration;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>Spot positions in factors with a history of log-shocks: prices end at 1, so that a quantity is a value.</summary>
/// <param name="Model">The model.</param>
/// <param name="Shocks">A row a factor A, B, ..., oldest first; NaN leaves the day's price out.</param>
internal sealed record HistoryBook(ModelSettings Model, params double[][] Shocks)
{
    public double[] Values { get; init; } = [.. Shocks.Select(_ => 1.0)];

    public int[] Horizons { get; init; } = [1];

    public int Scenarios { get; init; } = 20_000;

    public IReadOnlyList<MeasureSpec> Measures =>
        [.. from days in Horizons from spec in new MeasureSpec[] { new(MeasureKind.Var, new(0.99m), new(days)), new(MeasureKind.Es, new(0.975m), new(days)) } select spec];

    public Snapshot Snapshot()
    {
        var market = new Market();
        foreach (var (j, shocks) in Shocks.Index()) market.Equity(Name(j), Prices(shocks));
        return market.Snapshot() with
        {
            Settings = new() { Model = Model, Measures = Measures, Simulation = new() { Scenarios = Scenarios, Cap = 2 * Scenarios } },
            Books = [new("ALL", null, "All", "EUR")],
            Factors = [.. market.Factors.Select(f => f with { Currency = "EUR" })],
            Instruments = Shocks.Select((_, j) => (Instrument)new Spot(Name(j)) { Name = Name(j), Currency = "EUR" }).ToDictionary(i => i.Name, StringComparer.Ordinal),
            Positions = [.. Values.Select((value, j) => new Domain.Books.Position("ALL", Name(j), value))],
        };
    }

    public CompiledBook Compiled() => CompiledBook.Of(Snapshot(), Horizons);

    /// <summary>The measures of the book, with nothing else of a run.</summary>
    public IReadOnlyList<MeasureResult> Measured()
    {
        var book = Compiled();
        var outcome = new LookedRun(book.Tree, book.Plan, [], Measures, book.Snapshot.Settings.Simulation).Run(2, null, CancellationToken.None);
        return [.. Measures.Select(m => outcome.Measures.Of(0, m, outcome.Level))];
    }

    /// <summary>Independent normals from a seed, by sums of twelve uniforms less six: light-tailed, and the same everywhere.</summary>
    public static double[] Normals(int count, int seed)
    {
        var random = new Random(seed);
        return [.. Enumerable.Range(0, count).Select(_ => Enumerable.Range(0, 12).Sum(_ => random.NextDouble()) - 6)];
    }

    private static double[] Prices(double[] shocks)
    {
        var logs = new double[shocks.Length + 1];
        for (var t = shocks.Length - 1; t >= 0; t--) logs[t] = logs[t + 1] - (double.IsNaN(shocks[t]) ? 0 : shocks[t]);
        var prices = logs.Select(Math.Exp).ToArray();
        for (var t = 0; t < shocks.Length; t++)
        {
            if (double.IsNaN(shocks[t])) prices[t + 1] = double.NaN;
        }
        return prices;
    }

    private static string Name(int factor) => ((char)('A' + factor)).ToString();
}
