using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Models;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Options;

namespace RiskWorker.Engine.Plans;

/// <summary>The formulas of a plan's options by instrument: numerical ones as tables, which are built once, over the cores given.</summary>
internal static class PriceTables
{
    /// <summary>A formula for each instrument.</summary>
    /// <param name="options">Options by instrument.</param>
    /// <param name="moves">How the factors move.</param>
    /// <param name="law">How those moves are distributed.</param>
    /// <param name="levels">Their levels today.</param>
    /// <param name="horizons">Horizons of the plan.</param>
    /// <param name="threads">Threads to use; no table depends on how many.</param>
    /// <param name="cancellation">Stops between tables.</param>
    public static Dictionary<string, OptionFormula> Build(
        IReadOnlyList<(string Instrument, BoundOption Option)> options, FactorMoves moves, ScenarioLaw law, double[] levels, IReadOnlyList<Horizon> horizons, int threads, CancellationToken cancellation)
    {
        var ranges = new MarketRanges(moves, law, levels, horizons);
        var formulas = new OptionFormula[options.Count];
        Parallel.For(0, formulas.Length, new ParallelOptions { MaxDegreeOfParallelism = threads, CancellationToken = cancellation }, i =>
        {
            var option = options[i].Option;
            var spot = option.Underlying.LevelOf(levels);
            var formula = option.FormulaAt(spot);
            formulas[i] = formula is NumericFormula numeric ? PriceTable.Build(numeric, spot, ranges.Of(option)) : formula;
        });
        return options.Zip(formulas).ToDictionary(o => o.First.Instrument, o => o.Second, StringComparer.Ordinal);
    }
}
