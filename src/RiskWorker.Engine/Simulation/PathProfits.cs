using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing.Ageing;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Simulation;

/// <summary>Follows paths from look to look, and values options that hang on them.</summary>
internal sealed class PathProfits(int capacity)
{
    private readonly double[] _values = new double[capacity];
    private readonly LaneTable _states = new();
    private readonly LaneTable _returns = new();
    private readonly MomentExtremes _extremes = new(capacity);
    private RevaluationPlan _plan = null!;
    private double[][] _variances = [];
    private long _first;
    private int _horizon;

    /// <summary>Turns to <paramref name="plan"/>, which ages.</summary>
    public void Serve(RevaluationPlan plan)
    {
        _plan = plan;
        _extremes.Serve(plan);
        _variances = [.. plan.Aged.Select(VariancesOf)];
        _states.Shape(plan.Aged.Max(a => a.Paths.Count), capacity);
        _returns.Shape(plan.Aged.Max(a => a.Paths.Count), capacity);
    }

    // Of a day's log-return, where moments between closes count; 0 elsewhere.
    private double[] VariancesOf(AgedHoldings aged)
    {
        var variances = new double[aged.Paths.Count];
        foreach (var look in aged.Closes.SelectMany(c => c.Looks).Where(l => l.IsContinuous))
        {
            var deviation = _plan.Moves.DeviationOf([.. look.Underlying.Terms()]);
            variances[look.Path] = deviation * deviation;
        }
        return variances;
    }

    /// <summary>Puts the paths of a horizon where they stand today, in scenarios <paramref name="first"/> to first + width - 1.</summary>
    public void Begin(int horizon, long first, int width)
    {
        (_first, _horizon, _states.Width, _returns.Width) = (first, horizon, width, width);
        var paths = _plan.Aged[horizon].Paths;
        for (var p = 0; p < paths.Count; p++)
        {
            _states[p].Fill(paths[p].State);
            _returns[p].Fill(paths[p].Return);
        }
    }

    /// <summary>Takes the looks of a close, which the market has been moved to.</summary>
    public void Look(DatedHoldings close, MarketLanes market)
    {
        var isDrawn = false;
        for (var i = 0; i < close.Looks.Count; i++)
        {
            var look = close.Looks[i];
            if (i == 0 || look.Underlying != close.Looks[i - 1].Underlying)
            {
                market.Underlying(look.Underlying);
                isDrawn = false;
            }
            if (_variances[_horizon][look.Path] > 0 && !isDrawn)
            {
                _extremes.Draw(look.Underlying, _plan.Horizons[_horizon].Days, close.Day, _first, market.Width);
                isDrawn = true;
            }
            Look(look, market);
        }
    }

    private void Look(in PathLook look, MarketLanes market)
    {
        var states = _states[look.Path];
        switch (look.Kind)
        {
            case LookKind.Sum:
                Elementwise.Add(market.Spots, states);
                return;
            case LookKind.ReturnSum:
                Elementwise.Add(market.Returns, states);
                return;
        }
        var reached = market.Spots;
        if (_variances[_horizon][look.Path] > 0)
        {
            _extremes.Fill(look.Kind is LookKind.CrossedUp or LookKind.Highest, look.Spot, _variances[_horizon][look.Path], _returns[look.Path], market.Returns, _values.AsSpan(0, market.Width));
            market.Returns.CopyTo(_returns[look.Path]);
            reached = _values.AsSpan(0, market.Width);
        }
        for (var s = 0; s < states.Length; s++)
        {
            states[s] = look.Kind switch
            {
                LookKind.CrossedUp => reached[s] >= look.Barrier ? 1 : states[s],
                LookKind.CrossedDown => reached[s] <= look.Barrier ? 1 : states[s],
                LookKind.Highest => Math.Max(states[s], reached[s]),
                _ => Math.Min(states[s], reached[s]),
            };
        }
    }

    /// <summary>Adds the options of <paramref name="batch"/> at the market's close.</summary>
    public void Add(PathBatch batch, MarketLanes market, LaneTable cells)
    {
        market.Underlying(batch.Underlying);
        var seen = market.Terms(batch.Market);
        var values = _values.AsSpan(0, market.Width);
        for (var i = 0; i < batch.Items.Length; i++)
        {
            ref readonly var item = ref batch.Items[i];
            item.Formula.Fill(seen, _states[item.Path], values);
            BookProfit.AddLinear(values, item.BaseValue, item.Quantity, cells[item.Cell]);
        }
    }
}
