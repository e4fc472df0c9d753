using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Runs;

/// <summary>Runs the steps of liquidity-adjusted measures: the same draws once more for every liquidity horizon beyond the base.</summary>
internal static class LiquidityCascades
{
    /// <summary>The cascades by base horizon; none where no measure asks for one.</summary>
    /// <param name="lines">What is held, and how to run it.</param>
    /// <param name="factors">The factors, with their liquidity horizons.</param>
    /// <param name="plan">The plan of the model.</param>
    /// <param name="outcome">What its last look saw.</param>
    /// <param name="settings">How to simulate.</param>
    public static Dictionary<Horizon, LiquidityCascade> Of(ModelLines lines, IReadOnlyList<Factor> factors, RevaluationPlan plan, LookOutcome outcome, SimulationSettings settings)
    {
        var cascades = new Dictionary<Horizon, LiquidityCascade>();
        foreach (var asked in lines.Measures.Where(m => m.Kind == MeasureKind.Les).GroupBy(m => m.Horizon))
        {
            var steps = new List<LiquidityStep> { new(asked.Key.Days, 1, outcome.Measures) };
            var (before, measures) = (asked.Key.Days, asked.Select(m => m with { Kind = MeasureKind.Es }).ToList());
            foreach (var days in factors.Select(f => f.LiquidityDays ?? 0).Where(days => days > asked.Key.Days).Distinct().Order())
            {
                var only = plan with { Moves = plan.Moves.Only(factor => factors[factor].LiquidityDays >= days), Horizons = plan.Horizons, Aged = [] }; // time passes once, in the base
                var step = new LookedRun(lines.Tree, only, [], measures, At(settings, outcome.Simulation.Scenarios)).Run(lines.Threads, null, lines.Cancellation);
                steps.Add(new(days, Math.Sqrt((double)(days - before) / asked.Key.Days), step.Measures));
                before = days;
            }
            cascades[asked.Key] = new(steps);
        }
        return cascades;
    }

    private static SimulationSettings At(SimulationSettings settings, int scenarios) => settings with { Scenarios = scenarios, Cap = scenarios, Looks = 1, Precision = null };
}
