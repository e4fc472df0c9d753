using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Models;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Plans;

/// <summary>
/// A book compiled for simulation: which factors move and how, what is held of each underlying, and how the parts add up
/// to nodes. Frozen and content-hashed: two plans of one hash give the same losses for every scenario, to the last bit.
/// </summary>
public sealed record RevaluationPlan
{
    /// <summary>Seed of every draw.</summary>
    public required ulong Seed { get; init; }

    /// <summary>How the factors move.</summary>
    public required FactorMoves Moves { get; init; }

    /// <summary>How those moves are distributed jointly.</summary>
    public ScenarioLaw Law { get; init; } = LognormalLaw.Instance;

    /// <summary>Horizons, ascending.</summary>
    public required IReadOnlyList<Horizon> Horizons { get; init; }

    /// <summary>Every currency held or reported in, the reporting currency first.</summary>
    public required IReadOnlyList<PlanCurrency> Currencies { get; init; }

    /// <summary>What is held, grouped by underlying in the order of <see cref="Pricing.UnderlyingKey"/>.</summary>
    public required IReadOnlyList<UnderlyingGroup> Groups { get; init; }

    /// <summary>Amounts discounted by the same form of the rates, summed by cell; forms ascending.</summary>
    public IReadOnlyList<FlowBatch> Flows { get; init; } = [];

    /// <summary>With ageing, what is held turns into by each horizon, in their order; empty where the valuation date stays, and <see cref="Groups"/> and <see cref="Flows"/> are revalued.</summary>
    public IReadOnlyList<AgedHoldings> Aged { get; init; } = [];

    /// <summary>Sums of positions by node and currency, in that order.</summary>
    public required IReadOnlyList<PlanCell> Cells { get; init; }

    /// <summary>The tree, depth first: a parent before its children.</summary>
    public required IReadOnlyList<PlanNode> Nodes { get; init; }

    /// <summary>The series of losses that reductions see.</summary>
    public required IReadOnlyList<PlanRow> Rows { get; init; }

    /// <summary>SHA-256 of all of the above.</summary>
    public required string Hash { get; init; }

    /// <summary>The factors whose levels flows and formulas read, ascending.</summary>
    public int[] FormFactors => field ??= [.. Flows.SelectMany(f => f.Exponent.Factors.ToArray()).Concat(Groups.SelectMany(g => g.Formulas).SelectMany(f => f.Market.Factors()))
        .Concat(Aged.SelectMany(a => a.Closes).SelectMany(c => c.FormFactors)).Distinct().Order()];

    /// <summary>For each factor its place in <see cref="FormFactors"/>, or -1.</summary>
    public int[] FormRowOf => field ??= [.. Moves.RowOf.Select((_, factor) => Array.IndexOf(FormFactors, factor))];
}

/// <summary>How factors move over one business day: scale times a correlated normal, plus a drift.</summary>
/// <param name="Rank">Independent draws a scenario.</param>
/// <param name="Lower">Lower factor of the correlation, one row a moving factor in pivot order, row by row, <paramref name="Rank"/> entries each.</param>
/// <param name="RowOf">For each factor its row in <paramref name="Lower"/>, or -1 where its variance is zero.</param>
/// <param name="Rows">Moving factors.</param>
/// <param name="Factors">Each factor's law.</param>
public sealed record FactorMoves(int Rank, double[] Lower, int[] RowOf, int Rows, FactorLaw[] Factors)
{
    /// <summary>The factor of each row, whether or not it is held still.</summary>
    public int[] FactorOf { get; private init; } = Inverse(RowOf, Rows);

    /// <summary>The same draws with every factor held at its level but those that <paramref name="moves"/> names.</summary>
    public FactorMoves Only(Func<int, bool> moves) => this with { RowOf = [.. RowOf.Select((row, factor) => moves(factor) ? row : -1)] };

    private static int[] Inverse(int[] rowOf, int rows)
    {
        var factors = new int[rows];
        for (var factor = 0; factor < rowOf.Length; factor++)
        {
            if (rowOf[factor] >= 0) factors[rowOf[factor]] = factor;
        }
        return factors;
    }

    /// <summary>The moves of <paramref name="model"/>.</summary>
    public static FactorMoves Of(CalibratedModel model)
    {
        var rowOf = new int[model.Factors.Count];
        Array.Fill(rowOf, -1);
        for (var row = 0; row < model.Moving.Length; row++) rowOf[model.Moving[row]] = row;
        var laws = new FactorLaw[rowOf.Length];
        for (var j = 0; j < laws.Length; j++)
            laws[j] = new(model.Levels[j], model.Deviations[j], model.DailyDrift[j], model.Factors[j].Shock == Domain.Market.ShockKind.Lognormal);
        return new(model.Rank, model.Lower, rowOf, model.Moving.Length, laws);
    }

    /// <summary>Standard deviation of a day's shocks of several factors, each times its weight, added.</summary>
    public double DeviationOf(ReadOnlySpan<(int Factor, double Weight)> terms)
    {
        var variance = 0.0;
        for (var k = 0; k < Rank; k++)
        {
            var loading = 0.0;
            foreach (var (factor, weight) in terms)
            {
                if (RowOf[factor] >= 0) loading = Math.FusedMultiplyAdd(weight * Factors[factor].Deviation, Lower[(RowOf[factor] * Rank) + k], loading);
            }
            variance = Math.FusedMultiplyAdd(loading, loading, variance);
        }
        return Math.Sqrt(variance);
    }
}

/// <summary>The law of one factor over h days: x = Deviation sqrt(h) Z + Drift h, then S = Level e^x or Level + x.</summary>
/// <param name="Level">Level today.</param>
/// <param name="Deviation">Standard deviation of a day's shock.</param>
/// <param name="Drift">Mean of a day's shock: for a log-normal factor the log-drift.</param>
/// <param name="IsLognormal">Whether the shock is a log-return.</param>
public readonly record struct FactorLaw(double Level, double Deviation, double Drift, bool IsLognormal);

/// <summary>A currency and its price in the reporting currency.</summary>
/// <param name="Code">ISO code.</param>
/// <param name="Factor">Its fx factor, or -1 for the reporting currency.</param>
/// <param name="Rate">Its price today.</param>
public readonly record struct PlanCurrency(string Code, int Factor, double Rate);

/// <summary>Everything that is held of one underlying.</summary>
/// <param name="Key">The underlying.</param>
/// <param name="Spot">Its price today.</param>
/// <param name="Linear">Units held by cell.</param>
/// <param name="Options">Options with a flat volatility, and those on each volatility factor, batch by batch.</param>
/// <param name="Formulas">All other options, a batch for each reading of the market.</param>
public sealed record UnderlyingGroup(Pricing.UnderlyingKey Key, double Spot, IReadOnlyList<LinearHolding> Linear, IReadOnlyList<OptionBatch> Options, IReadOnlyList<FormulaBatch> Formulas);

/// <summary>Options of any formula that see the same rates and variance up to their expiry.</summary>
/// <param name="Market">How these follow from the levels.</param>
/// <param name="Items">The options, by cell, then instrument.</param>
public sealed record FormulaBatch(Pricing.MarketTerms Market, FormulaItem[] Items);

/// <summary>One such option held in one cell.</summary>
/// <param name="Cell">Where its profit goes.</param>
/// <param name="Quantity">Units times multiplier.</param>
/// <param name="BaseValue">Its value today, as the formula has it.</param>
/// <param name="Formula">The formula.</param>
public readonly record struct FormulaItem(int Cell, double Quantity, double BaseValue, Pricing.Options.OptionFormula Formula);

/// <summary>Amounts discounted alike.</summary>
/// <param name="Exponent">Minus the logarithm of the discount factor.</param>
/// <param name="Factor">The discount factor today.</param>
/// <param name="Amounts">Amounts by cell.</param>
public sealed record FlowBatch(Pricing.Curves.LinearForm Exponent, double Factor, IReadOnlyList<LinearHolding> Amounts);

/// <summary>Units of an underlying in a cell: its profit is units times the change of price.</summary>
public readonly record struct LinearHolding(int Cell, double Units);

/// <summary>Options on one underlying that share their source of volatility.</summary>
/// <param name="VolatilityFactor">The factor that carries it, or -1 for a flat one.</param>
/// <param name="Items">The options, by cell, then instrument.</param>
/// <param name="Terms">Their terms, in the order of <paramref name="Items"/>.</param>
public sealed record OptionBatch(int VolatilityFactor, OptionItem[] Items, EuropeanOptionTerms[] Terms);

/// <summary>One option held in one cell.</summary>
/// <param name="Cell">Where its profit goes.</param>
/// <param name="Quantity">Units times multiplier.</param>
/// <param name="BaseValue">Its value today.</param>
public readonly record struct OptionItem(int Cell, double Quantity, double BaseValue);

/// <summary>The positions of a node in one currency.</summary>
/// <param name="Node">The node.</param>
/// <param name="Currency">Place in the plan's currencies.</param>
/// <param name="Value">Value today in that currency.</param>
public readonly record struct PlanCell(int Node, int Currency, double Value);

/// <summary>A node of the tree.</summary>
/// <param name="Book">Its book.</param>
/// <param name="Parent">Its parent's place; -1 for the root.</param>
/// <param name="Currency">Place of its own currency in the plan's currencies.</param>
/// <param name="ValueRoot">Value today, children included, in the reporting currency.</param>
public readonly record struct PlanNode(string Book, int Parent, int Currency, double ValueRoot);

/// <summary>A series of losses: a node at a horizon, in its own or in the reporting currency.</summary>
/// <param name="Node">The node.</param>
/// <param name="Horizon">Place in the plan's horizons.</param>
/// <param name="InOwnCurrency">True for the node's own currency, where that is not the reporting currency.</param>
public readonly record struct PlanRow(int Node, int Horizon, bool InOwnCurrency);
