using System.Globalization;
using System.Text.Json;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Calibration;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>
/// Historical simulation of four stock indices in equal weights, day by day over 1,609 days, through calibration, law and measures, against
/// Data/eustock/historical.json (its README says how that was made): every exception on its date.
/// </summary>
public sealed class HistoricalIndexTests
{
    private const int Window = 250;

    private static readonly MeasureSpec s_var = new(MeasureKind.Var, new(0.99m), new(1));
    private static readonly ModelSettings s_model = new() { Kind = ModelKind.Historical, Window = Window };

    [Fact]
    public void Exceptions_of_the_index_book_fall_on_their_dates()
    {
        var market = IndexCloses.Market();
        market.Model = s_model;
        var snapshot = Holding(market.Snapshot());
        var table = ShockTable.From(snapshot);
        var dates = table.Dates.ToArray();
        var book = CompiledBook.Of(snapshot, 1);
        var (vars, exceptions) = (new List<double>(), new List<bool>());
        for (var t = Window + 1; t < dates.Length; t++)
        {
            vars.Add(Var(book, Calibrator.Calibrate(snapshot, table, s_model, 1, dates[t - 1])));
            exceptions.Add(-Return(table, t) > vars[^1]);
        }

        using var expected = JsonDocument.Parse(File.ReadAllText(Path.Combine(AppContext.BaseDirectory, "Data", "eustock", "historical.json")));
        double Number(string key) => expected.RootElement.GetProperty(key).GetDouble();
        Assert.Equal(1609, exceptions.Count);
        Assert.Equal(expected.RootElement.GetProperty("exception_dates").EnumerateArray().Select(d => d.GetString()),
            exceptions.Index().Where(e => e.Item).Select(e => dates[Window + 1 + e.Index].ToString("yyyy-MM-dd", CultureInfo.InvariantCulture)));
        Assert.Equal((Number("VaR_first"), Number("VaR_last")), (vars[0], vars[^1]), RelativePair);
        Assert.Equal(Number("VaR_sum"), vars.Sum(), 1e-11);
        Hold(Number("LR_pof"), Number("p_pof"), CoverageTests.Coverage(exceptions, s_var.Confidence));
        Hold(Number("LR_ind"), Number("p_ind"), CoverageTests.Independence(exceptions));
        Hold(Number("LR_cc"), Number("p_cc"), CoverageTests.Conditional(exceptions, s_var.Confidence));
    }

    private static bool RelativePair((double, double) a, (double, double) b) => Math.Abs((a.Item1 / b.Item1) - 1) < 1e-12 && Math.Abs((a.Item2 / b.Item2) - 1) < 1e-12;

    private static void Hold(double statistic, double p, Domain.Runs.TestResult? found)
    {
        Assert.Equal(statistic, found!.Statistic, 1e-10);
        Assert.Equal(p, found.PValue, 1e-10);
    }

    // A quarter of 1 in each index at today's level; the moves of a scenario are S(e^x - 1) whatever the level is.
    private static Snapshot Holding(Snapshot snapshot) => snapshot with
    {
        Books = [new("ALL", null, "All", "EUR")],
        Factors = [.. snapshot.Factors.Select(f => f with { Currency = "EUR" })],
        Instruments = IndexCloses.Names.ToDictionary(n => n, Instrument (n) => new Spot(n) { Name = n, Currency = "EUR" }, StringComparer.Ordinal),
        Positions = [.. IndexCloses.Names.Order(StringComparer.Ordinal).Select(n => new Domain.Books.Position("ALL", n, 0.25 / LastClose(snapshot, n)))],
    };

    private static double LastClose(Snapshot snapshot, string factor)
    {
        var table = ShockTable.From(snapshot);
        return table.Values(snapshot.Factors.Index().Single(f => f.Item.Name == factor).Index)[^1];
    }

    private static double Var(CompiledBook book, CalibratedModel model)
    {
        var outcome = new LookedRun(book.Tree, book.Plan with { Moves = FactorMoves.Of(model), Law = model.Law }, [], [s_var], new()).Run(1, null, CancellationToken.None);
        return outcome.Measures.Of(0, s_var, outcome.Level).Value;
    }

    private static double Return(ShockTable table, int t) => Enumerable.Range(0, 4).Average(j => (table.Values(j)[t] / table.Values(j)[t - 1]) - 1);
}
