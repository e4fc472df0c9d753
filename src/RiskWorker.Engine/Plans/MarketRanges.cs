using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Models;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Plans;

/// <summary>How far the scenarios of a run may carry what an option depends on: as many standard deviations either way as the law reaches, over all horizons.</summary>
internal sealed class MarketRanges(FactorMoves moves, ScenarioLaw law, double[] levels, IReadOnlyList<Horizon> horizons)
{
    // What does not move still needs a table of some width.
    private const double Narrowest = 1e-4;

    /// <summary>The box of <paramref name="option"/>.</summary>
    public MarketRange Of(BoundOption option) => Of(option.Underlying, option.Market);

    /// <summary>The box of an option on <paramref name="underlying"/> that sees <paramref name="market"/>.</summary>
    public MarketRange Of(in UnderlyingKey underlying, MarketTerms market) => new(
        Return(underlying) is var x && x.HalfWidth > Narrowest ? x : x with { HalfWidth = Narrowest },
        Form(market.Discount), Form(market.Carry), Deviation(market.Variance));

    private InputRange Return(in UnderlyingKey key) => Over(0, [.. key.Terms()]);

    // Levels of rates and spreads move by their shocks; one with log-normal shocks by about its level times them.
    private InputRange Form(LinearForm form)
    {
        var terms = new (int Factor, double Weight)[form.Factors.Length];
        for (var i = 0; i < terms.Length; i++)
            terms[i] = (form.Factors[i], form.Coefficients[i] * (moves.Factors[form.Factors[i]].IsLognormal ? levels[form.Factors[i]] : 1));
        return Over(form.At(levels), terms);
    }

    // All volatilities at their lowest, and at their highest.
    private InputRange Deviation(VarianceForm variance)
    {
        var (low, high) = (variance.Constant, variance.Constant);
        foreach (var (factor, weight) in variance.Terms)
        {
            var range = Over(0, [(factor, 1)]);
            low = Elementwise.AddSquare(LogNormalMoves.Spot(range.Centre - range.HalfWidth, levels[factor]), weight, low);
            high = Elementwise.AddSquare(LogNormalMoves.Spot(range.Centre + range.HalfWidth, levels[factor]), weight, high);
        }
        return Between(Math.Sqrt(low), Math.Sqrt(high));
    }

    private InputRange Over(double start, (int Factor, double Weight)[] terms)
    {
        var (low, high, daily) = (double.PositiveInfinity, double.NegativeInfinity, moves.DeviationOf(terms));
        var drift = terms.Sum(t => t.Weight * moves.Factors[t.Factor].Drift);
        if (daily == 0 && drift == 0) return new(start, 0);
        foreach (var horizon in horizons)
        {
            var (centre, half) = (start + (drift * horizon.Days), law.Reach(horizon.Days) * daily * Math.Sqrt(horizon.Days));
            (low, high) = (Math.Min(low, centre - half), Math.Max(high, centre + half));
        }
        return Between(low, high);
    }

    private static InputRange Between(double low, double high) => new((low + high) / 2, (high - low) / 2);
}
