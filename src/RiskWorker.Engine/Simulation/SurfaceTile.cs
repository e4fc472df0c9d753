using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Surfaces;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// Draws scenarios and values them by surface, and revalues fully every scenario of a node whose loss by surface lies above
/// the node's threshold less the surfaces' bound: no other can lie above the threshold. The buffers of one thread.
/// </summary>
internal sealed class SurfaceTile
{
    private readonly RevaluationPlan _plan;
    private readonly SurfaceSet _surfaces;
    private readonly ScenarioTile _tile;
    private readonly SurfaceProfits _profits;
    private readonly ExactPass _exact;
    private readonly double[] _highestRate;
    private readonly double[] _lowestRate;
    private double[] _bySurface = [];
    private readonly bool[] _isNear = new bool[ScenarioTile.Width];

    /// <summary>Allocates the buffers.</summary>
    public SurfaceTile(RevaluationPlan plan, SurfaceSet surfaces, ScenarioTile tile)
    {
        (_plan, _surfaces, _tile) = (plan, surfaces, tile);
        (_profits, _exact) = (new(plan, surfaces, ScenarioTile.Width), new(plan, PlanSlice.OfNodes(plan)));
        (_highestRate, _lowestRate) = (new double[plan.Currencies.Count], new double[plan.Currencies.Count]);
    }

    /// <summary>Whether it was made for <paramref name="surfaces"/>.</summary>
    public bool Serves(SurfaceSet surfaces) => ReferenceEquals(surfaces, _surfaces);

    /// <summary>Scenarios revalued fully so far, each counted once for every node and horizon.</summary>
    public long Revalued => _exact.Revalued;

    /// <summary>Writes the losses of scenarios <paramref name="first"/> to first + width - 1 of a block; the last ones to be revalued only with <see cref="Finish"/>.</summary>
    /// <param name="first">Number of the first scenario.</param>
    /// <param name="width">1 to <see cref="ScenarioTile.Width"/>.</param>
    /// <param name="losses">The block's losses, a row a series, <see cref="Blocks.Size"/> apart.</param>
    /// <param name="offset">Place of the first scenario in each row.</param>
    /// <param name="exactFrom">For each series the loss from which figures must be those of full revaluation; infinity for nowhere.</param>
    public void Evaluate(long first, int width, double[] losses, int offset, ReadOnlySpan<double> exactFrom)
    {
        _tile.Draw(first, width);
        for (var horizon = 0; horizon < _plan.Horizons.Count; horizon++)
        {
            _tile.Evaluate(horizon, losses, offset, Blocks.Size, _profits);
            FindRates();
            for (var node = 0; node < _plan.Nodes.Count; node++) PutAside(node, horizon, width, losses, offset, exactFrom);
        }
    }

    /// <summary>Begins a block.</summary>
    public void Begin() => _exact.Begin();

    /// <summary>Completes the losses of the block.</summary>
    public void Finish(double[] losses) => _exact.Finish(losses);

    /// <summary>
    /// Writes the losses of scenarios <paramref name="first"/> to first + width - 1 by full revaluation, and counts those that a surface
    /// places further from them than its bound allows, each once for every series.
    /// </summary>
    public int Check(long first, int width, double[] losses, int offset)
    {
        _tile.Draw(first, width);
        Room.For(ref _bySurface, _plan.Rows.Count * ScenarioTile.Width);
        var faults = 0;
        for (var horizon = 0; horizon < _plan.Horizons.Count; horizon++)
        {
            _tile.Evaluate(horizon, losses, offset, Blocks.Size, null);
            _tile.Evaluate(horizon, _bySurface, 0, ScenarioTile.Width, _profits);
            FindRates();
            for (var row = 0; row < _plan.Rows.Count; row++)
            {
                if (_plan.Rows[row].Horizon != horizon) continue;
                var bound = BoundOf(_plan.Rows[row]);
                for (var s = 0; s < width; s++) faults += Math.Abs(_bySurface[(row * ScenarioTile.Width) + s] - losses[(row * Blocks.Size) + offset + s]) <= bound ? 0 : 1;
            }
        }
        return faults;
    }

    // At the tile's most expensive rates.
    private double BoundOf(PlanRow row)
    {
        var bound = 0.0;
        for (var c = 0; c < _highestRate.Length; c++) bound = Math.FusedMultiplyAdd(_surfaces.BoundOf(row.Horizon, row.Node, c), _highestRate[c], bound);
        return row.InOwnCurrency ? bound / _lowestRate[_plan.Nodes[row.Node].Currency] : bound;
    }

    private void FindRates()
    {
        (_highestRate[0], _lowestRate[0]) = (1, 1);
        for (var c = 1; c < _plan.Currencies.Count; c++)
        {
            var (low, high) = (double.PositiveInfinity, 0.0);
            foreach (var rate in _tile.Market.RatesOf(c)) (low, high) = (Math.Min(low, rate), Math.Max(high, rate));
            (_lowestRate[c], _highestRate[c]) = (low, high);
        }
    }

    private void PutAside(int node, int horizon, int width, double[] losses, int offset, ReadOnlySpan<double> exactFrom)
    {
        Span<int> near = stackalloc int[ScenarioTile.Width];
        var rows = _exact.RowsOf(node, horizon);
        foreach (var row in rows)
        {
            if (double.IsPositiveInfinity(exactFrom[row])) continue;
            var found = Selection.Greater(losses.AsSpan((row * Blocks.Size) + offset, width), Math.BitDecrement(exactFrom[row] - BoundOf(_plan.Rows[row])), near, out _);
            if (rows.Length == 1)
            {
                for (var i = 0; i < found; i++) _exact.Add(node, horizon, _tile.Moves, width, near[i], losses, offset + near[i]);
                return;
            }
            for (var i = 0; i < found; i++) _isNear[near[i]] = true;
        }
        if (rows.Length == 1) return;
        for (var lane = 0; lane < width; lane++)
        {
            if (_isNear[lane]) _exact.Add(node, horizon, _tile.Moves, width, lane, losses, offset + lane);
            _isNear[lane] = false;
        }
    }
}
