using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Simulation.Moves;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// Takes the scenarios of a tile through the closes of a horizon that moves the valuation date: what pays there, which rates are fixed, which
/// paths leave what, and at the end what is still alive. The buffers of one thread.
/// </summary>
internal sealed class HorizonPath(int capacity)
{
    private readonly LaneTable _fixings = new();
    private readonly double[] _exponents = new double[capacity];
    private readonly PathProfits _paths = new(capacity);
    private RevaluationPlan _plan = null!;
    private PlanSlice[][] _slices = [];

    /// <summary>Turns to <paramref name="plan"/>, which ages.</summary>
    public void Serve(RevaluationPlan plan)
    {
        _plan = plan;
        _slices = [.. plan.Aged.Select(aged => aged.Closes.Select(close => PlanSlice.Whole(plan, close)).ToArray())];
        _paths.Serve(plan);
        _fixings.Shape(plan.Aged.Max(a => a.Fixings), capacity);
    }

    /// <summary>What the horizon's own close values.</summary>
    public PlanSlice Last(int horizon) => _slices[horizon][^1];

    /// <summary>Sets the profits of the cells to what is certain, and adds what the closes before the horizon's own pay.</summary>
    public void Pass(int horizon, MoveSource source, MarketLanes market, long first, int width, LaneTable cells)
    {
        var aged = _plan.Aged[horizon];
        _fixings.Width = width;
        _paths.Begin(horizon, first, width);
        cells.Clear(0, _plan.Cells.Count);
        for (var c = 0; c < aged.Certain.Count; c++) cells[aged.Certain[c].Cell].Fill(aged.Certain[c].Units);
        for (var c = 0; c < aged.Closes.Count - 1; c++)
        {
            market.Take(source.Inside(horizon, aged.Closes[c].Day), _plan.Moves.RowOf, width, width, _plan.Law.GivesShocks);
            market.MoveInside(aged.Closes[c].Day, _slices[horizon][c]);
            Value(aged.Closes[c], _slices[horizon][c], market, cells);
        }
    }

    /// <summary>Adds what is alive at the horizon, which the market has been moved to.</summary>
    public void Arrive(int horizon, MarketLanes market, LaneTable cells) => Value(_plan.Aged[horizon].Closes[^1], Last(horizon), market, cells);

    private void Value(DatedHoldings close, PlanSlice slice, MarketLanes market, LaneTable cells)
    {
        _paths.Look(close, market);
        for (var i = 0; i < close.Fixings.Count; i++) market.Evaluate(close.Fixings[i].Exponent, _fixings[close.Fixings[i].Fixing]);
        HoldingProfits.Add(slice, market, cells);
        for (var b = 0; b < close.Paths.Count; b++) _paths.Add(close.Paths[b], market, cells);
        for (var b = 0; b < close.Fixed.Count; b++) Add(close.Fixed[b], market, cells);
    }

    private void Add(FixedBatch batch, MarketLanes market, LaneTable cells)
    {
        var factors = _exponents.AsSpan(0, market.Width);
        market.Evaluate(batch.Discount, factors);
        Elementwise.Add(_fixings[batch.Fixing], factors);
        Elementwise.Negate(factors, factors);
        Exponential.Of(factors, factors);
        for (var i = 0; i < batch.Amounts.Count; i++) BookProfit.AddLinear(factors, batch.Factor, batch.Amounts[i].Units, cells[batch.Amounts[i].Cell]);
    }
}
