using System.Diagnostics.CodeAnalysis;
using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// Draws and revalues some two hundred consecutive scenarios of a plan: the buffers of one thread, sized for its cache.
/// Every scenario is computed on its own, so the width of a tile changes no bit.
/// </summary>
public sealed class ScenarioTile
{
    /// <summary>Scenarios in a tile: ten panels of the triangular product, and buffers that fit the second-level cache.</summary>
    public const int Width = 240;

    private readonly double[] _still = new double[Width];
    private readonly double[] _returns = new double[Width];
    private readonly double[] _quoteReturns = new double[Width];
    private readonly double[] _spots = new double[Width];
    private readonly double[] _volatilities = new double[Width];
    private RevaluationPlan _plan;
    private DrawStream _stream;
    private double[] _roots = [];
    private double[] _draws = [];
    private double[] _normals = [];
    private double[] _rates = [];
    private double[] _cells = [];
    private double[] _nodes = [];

    /// <summary>Allocates the buffers for <paramref name="plan"/>.</summary>
    public ScenarioTile(RevaluationPlan plan) => Serve(plan);

    /// <summary>Turns to <paramref name="plan"/>; buffers that are large enough are used again.</summary>
    [MemberNotNull(nameof(_plan))]
    public void Serve(RevaluationPlan plan)
    {
        if (ReferenceEquals(_plan, plan)) return;
        _plan = plan;
        _stream = new(plan.Seed, DrawPurpose.FactorMoves, 0);
        _roots = [.. plan.Horizons.Select(h => Math.Sqrt(h.Days))];
        Room.For(ref _draws, (plan.Moves.Rank + 1) * Width); // room for the second half of an odd last pair
        Room.For(ref _normals, plan.Moves.Rows * Width);
        Room.For(ref _rates, plan.Currencies.Count * Width);
        Room.For(ref _cells, plan.Cells.Count * Width);
        Room.For(ref _nodes, plan.Nodes.Count * Width);
    }

    /// <summary>Writes the losses of scenarios <paramref name="first"/> to first + width - 1.</summary>
    /// <param name="first">Number of the first scenario.</param>
    /// <param name="width">1 to <see cref="Width"/>.</param>
    /// <param name="losses">A row a series, <paramref name="stride"/> apart.</param>
    /// <param name="offset">Place of the first scenario in each row.</param>
    /// <param name="stride">Distance of rows.</param>
    public void Evaluate(long first, int width, double[] losses, int offset, int stride)
    {
        Draw(first, width);
        for (var horizon = 0; horizon < _plan.Horizons.Count; horizon++)
        {
            Rates(horizon, width);
            Cells(horizon, width);
            Nodes(width);
            for (var row = 0; row < _plan.Rows.Count; row++)
            {
                if (_plan.Rows[row].Horizon == horizon) Losses(_plan.Rows[row], width, losses.AsSpan((row * stride) + offset, width));
            }
        }
    }

    private void Draw(long first, int width)
    {
        var moves = _plan.Moves;
        for (var draw = 0; draw < moves.Rank; draw += 2)
            NormalDraws.FillPair(_stream, (ulong)first, (uint)draw / 2, _draws.AsSpan(draw * width, width), _draws.AsSpan((draw + 1) * width, width));
        TriangularProduct.Multiply(moves.Lower, moves.Rows, moves.Rank, _draws.AsSpan(0, moves.Rank * width), _normals.AsSpan(0, moves.Rows * width), width);
    }

    private ReadOnlySpan<double> NormalsOf(int factor, int width) =>
        _plan.Moves.RowOf[factor] is var row && row < 0 ? _still.AsSpan(0, width) : _normals.AsSpan(row * width, width);

    /// <summary>Log-returns and levels of a log-normal factor; for a normal one only the levels have a meaning.</summary>
    private void Move(int factor, int horizon, Span<double> returns, Span<double> levels)
    {
        var law = _plan.Moves.Factors[factor];
        var (scale, drift) = (law.Deviation * _roots[horizon], law.Drift * _plan.Horizons[horizon].Days);
        if (law.IsLognormal)
        {
            LogNormalMoves.LogReturns(NormalsOf(factor, returns.Length), scale, drift, returns);
            LogNormalMoves.Spots(returns, law.Level, levels);
        }
        else
        {
            LogNormalMoves.Levels(NormalsOf(factor, returns.Length), scale, drift, law.Level, levels);
        }
    }

    private Span<double> RatesOf(int currency, int width) => _rates.AsSpan(currency * Width, width);

    private void Rates(int horizon, int width)
    {
        RatesOf(0, width).Fill(1);
        for (var c = 1; c < _plan.Currencies.Count; c++) Move(_plan.Currencies[c].Factor, horizon, _returns.AsSpan(0, width), RatesOf(c, width));
    }

    private void Cells(int horizon, int width)
    {
        Array.Clear(_cells, 0, _plan.Cells.Count * Width);
        for (var g = 0; g < _plan.Groups.Count; g++)
        {
            var group = _plan.Groups[g];
            Underlying(group, horizon, width);
            Span<double> returns = _returns.AsSpan(0, width), spots = _spots.AsSpan(0, width);
            // By index: an enumerator of an interface would be allocated for every tile.
            for (var h = 0; h < group.Linear.Count; h++)
                BookProfit.AddLinear(spots, group.Spot, group.Linear[h].Units, _cells.AsSpan(group.Linear[h].Cell * Width, width));
            for (var b = 0; b < group.Options.Count; b++) Options(group.Options[b], horizon, returns, spots);
        }
    }

    private void Underlying(UnderlyingGroup group, int horizon, int width)
    {
        Span<double> returns = _returns.AsSpan(0, width), spots = _spots.AsSpan(0, width);
        if (!group.Key.IsCross)
        {
            Move(group.Key.Factor, horizon, returns, spots);
            return;
        }
        returns.Clear();
        spots.Fill(1);
        if (group.Key.Factor >= 0) Move(group.Key.Factor, horizon, returns, spots);
        if (group.Key.Quote >= 0)
        {
            Span<double> quoteReturns = _quoteReturns.AsSpan(0, width), quotes = _volatilities.AsSpan(0, width);
            Move(group.Key.Quote, horizon, quoteReturns, quotes);
            Elementwise.Subtract(quoteReturns, returns);
            Elementwise.DivideBy(quotes, spots);
        }
    }

    private void Options(OptionBatch batch, int horizon, ReadOnlySpan<double> returns, ReadOnlySpan<double> spots)
    {
        var (width, terms) = (returns.Length, batch.Terms[horizon]);
        if (batch.VolatilityFactor < 0)
        {
            for (var i = 0; i < terms.Length; i++)
            {
                ref readonly var item = ref batch.Items[i];
                EuropeanOption.AccumulateValue(terms[i], returns, spots, item.Quantity, item.BaseValue, _cells.AsSpan(item.Cell * Width, width));
            }
            return;
        }
        var volatilities = _volatilities.AsSpan(0, width);
        Move(batch.VolatilityFactor, horizon, _quoteReturns.AsSpan(0, width), volatilities);
        for (var i = 0; i < terms.Length; i++)
        {
            ref readonly var item = ref batch.Items[i];
            EuropeanOption.AccumulateValue(terms[i], returns, spots, volatilities, item.Quantity, item.BaseValue, _cells.AsSpan(item.Cell * Width, width));
        }
    }

    private void Nodes(int width)
    {
        Array.Clear(_nodes, 0, _plan.Nodes.Count * Width);
        for (var c = 0; c < _plan.Cells.Count; c++)
        {
            var cell = _plan.Cells[c];
            BookProfit.AddConverted(_cells.AsSpan(c * Width, width), cell.Value, RatesOf(cell.Currency, width), _plan.Currencies[cell.Currency].Rate, _nodes.AsSpan(cell.Node * Width, width));
        }
        for (var node = _plan.Nodes.Count - 1; node > 0; node--)
            Elementwise.Add(_nodes.AsSpan(node * Width, width), _nodes.AsSpan(_plan.Nodes[node].Parent * Width, width));
    }

    private void Losses(PlanRow row, int width, Span<double> losses)
    {
        var node = _plan.Nodes[row.Node];
        var profit = _nodes.AsSpan(row.Node * Width, width);
        if (row.InOwnCurrency)
            BookProfit.LossInCurrency(profit, node.ValueRoot, RatesOf(node.Currency, width), _plan.Currencies[node.Currency].Rate, losses);
        else
            Elementwise.Negate(profit, losses);
    }
}
