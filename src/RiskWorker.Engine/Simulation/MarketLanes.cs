using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// The market in some scenarios at one horizon, as moved by their correlated normals or by shocks given outright: returns and levels of an
/// underlying, volatilities, exchange rates. A lane a scenario; every lane is computed on its own, so which lanes stand side by side changes no bit.
/// </summary>
internal sealed class MarketLanes
{
    private readonly double[] _still;
    private readonly double[] _returns;
    private readonly double[] _spots;
    private readonly double[] _volatilityReturns;
    private readonly double[] _volatilities;
    private readonly double[] _discounts;
    private readonly double[] _carries;
    private readonly double[] _deviations;
    private readonly LaneTable _rates = new();
    private readonly LaneTable _levels = new();
    private readonly int _capacity;
    private RevaluationPlan _plan = null!;
    private double[] _roots = [];
    private double[] _moves = [];
    private int[] _rowOf = [];
    private int _stride;
    private double _root;
    private int _days;
    private bool _areShocks;

    /// <summary>Makes room for <paramref name="capacity"/> lanes.</summary>
    public MarketLanes(int capacity)
    {
        _capacity = capacity;
        (_still, _returns, _spots) = (new double[capacity], new double[capacity], new double[capacity]);
        (_volatilityReturns, _volatilities) = (new double[capacity], new double[capacity]);
        (_discounts, _carries, _deviations) = (new double[capacity], new double[capacity], new double[capacity]);
    }

    /// <summary>Lanes in use.</summary>
    public int Width { get; private set; }

    /// <summary>Log-returns of the underlying last asked for; meaningless where its shocks are normal.</summary>
    public ReadOnlySpan<double> Returns => _returns.AsSpan(0, Width);

    /// <summary>Its levels.</summary>
    public ReadOnlySpan<double> Spots => _spots.AsSpan(0, Width);

    /// <summary>Log-returns of the volatility last asked for.</summary>
    public ReadOnlySpan<double> VolatilityReturns => _volatilityReturns.AsSpan(0, Width);

    /// <summary>Its levels.</summary>
    public ReadOnlySpan<double> Volatilities => _volatilities.AsSpan(0, Width);

    /// <summary>Turns to <paramref name="plan"/>.</summary>
    public void Serve(RevaluationPlan plan)
    {
        _plan = plan;
        _roots = [.. plan.Horizons.Select(h => Math.Sqrt(h.Days))];
        _rates.Shape(plan.Currencies.Count, _capacity);
        _levels.Shape(plan.FormFactors.Length, _capacity);
    }

    /// <summary>Takes the moves of the lanes.</summary>
    /// <param name="moves">A row a factor, <paramref name="stride"/> apart: multiples of a day's deviation, or shocks outright.</param>
    /// <param name="rowOf">For each factor its row, or -1 where it stays at its level of today.</param>
    /// <param name="stride">Distance of rows.</param>
    /// <param name="width">Lanes.</param>
    /// <param name="areShocks">
    /// Whether they are shocks, log-returns of a log-normal factor and differences of a normal one: no deviation, no drift and no number
    /// of days is then applied to them.
    /// </param>
    public void Take(double[] moves, int[] rowOf, int stride, int width, bool areShocks) =>
        (_moves, _rowOf, _stride, Width, _rates.Width, _levels.Width, _areShocks) = (moves, rowOf, stride, width, width, width, areShocks);

    /// <summary>Goes to a horizon, converts the currencies of <paramref name="slice"/> and moves the factors of its curves.</summary>
    public void MoveTo(int horizon, PlanSlice slice) => MoveTo(_roots[horizon], _plan.Horizons[horizon].Days, slice);

    /// <summary>The same at the close of a day inside a horizon, whose moves are those of <see cref="Moves.MoveSource.Inside"/>.</summary>
    public void MoveInside(int day, PlanSlice slice) => MoveTo(1, day, slice);

    private void MoveTo(double root, int days, PlanSlice slice)
    {
        (_root, _days) = (root, days);
        _rates[0].Fill(1);
        // The returns are scratch here: an underlying is moved only afterwards.
        foreach (var currency in slice.Currencies) Move(_plan.Currencies[currency].Factor, _returns.AsSpan(0, Width), _rates[currency]);
        foreach (var factor in slice.FormFactors) Move(factor, _returns.AsSpan(0, Width), _levels[_plan.FormRowOf[factor]]);
    }

    /// <summary>Price of currency <paramref name="currency"/> in each lane.</summary>
    public ReadOnlySpan<double> RatesOf(int currency) => _rates[currency];

    /// <summary>Moves an underlying: <see cref="Returns"/> and <see cref="Spots"/> are then its own.</summary>
    public void Underlying(in Pricing.UnderlyingKey key)
    {
        Span<double> returns = _returns.AsSpan(0, Width), spots = _spots.AsSpan(0, Width);
        if (!key.IsCross)
        {
            Move(key.Factor, returns, spots);
            return;
        }
        returns.Clear();
        spots.Fill(1);
        if (key.Factor >= 0) Move(key.Factor, returns, spots);
        if (key.Quote >= 0)
        {
            Span<double> quoteReturns = _volatilityReturns.AsSpan(0, Width), quotes = _volatilities.AsSpan(0, Width);
            Move(key.Quote, quoteReturns, quotes);
            Elementwise.Subtract(quoteReturns, returns);
            Elementwise.DivideBy(quotes, spots);
        }
    }

    /// <summary>Moves a volatility: <see cref="VolatilityReturns"/> and <see cref="Volatilities"/> are then its own.</summary>
    public void Volatility(int factor) => Move(factor, _volatilityReturns.AsSpan(0, Width), _volatilities.AsSpan(0, Width));

    /// <summary>The discount factor of a form of the rates in each lane, written over by the next.</summary>
    public ReadOnlySpan<double> DiscountFactors(LinearForm exponent)
    {
        var factors = _discounts.AsSpan(0, Width);
        Evaluate(exponent, factors);
        Elementwise.Negate(factors, factors);
        Exponential.Of(factors, factors);
        return factors;
    }

    /// <summary>What options on the underlying last moved to see of the market up to their expiry; written over by the next.</summary>
    public MarketSpans Terms(Pricing.MarketTerms terms)
    {
        Span<double> discounts = _discounts.AsSpan(0, Width), carries = _carries.AsSpan(0, Width), deviations = _deviations.AsSpan(0, Width);
        Evaluate(terms.Discount, discounts);
        Evaluate(terms.Carry, carries);
        deviations.Fill(terms.Variance.Constant);
        foreach (var (factor, weight) in terms.Variance.Span) Elementwise.AddSquare(_levels[_plan.FormRowOf[factor]], weight, deviations);
        Elementwise.SquareRoot(deviations, deviations);
        return new(Returns, Spots, discounts, carries, deviations);
    }

    /// <summary>A form of the rates in each lane, as <see cref="LinearForm.At"/>.</summary>
    public void Evaluate(LinearForm form, Span<double> values)
    {
        values.Fill(form.Constant);
        for (var i = 0; i < form.Factors.Length; i++) BookProfit.AddLinear(_levels[_plan.FormRowOf[form.Factors[i]]], 0, form.Coefficients[i], values);
    }

    private void Move(int factor, Span<double> returns, Span<double> levels)
    {
        var law = _plan.Moves.Factors[factor];
        // A shock is a normal of scale 1: 1 x + 0 is x to the bit.
        var (scale, drift) = _areShocks ? (1, 0) : (law.Deviation * _root, law.Drift * _days);
        var moves = _rowOf[factor] is var row && row < 0 ? _still.AsSpan(0, Width) : _moves.AsSpan(row * _stride, Width);
        if (law.IsLognormal)
        {
            LogNormalMoves.LogReturns(moves, scale, drift, returns);
            LogNormalMoves.Spots(returns, law.Level, levels);
        }
        else
        {
            LogNormalMoves.Levels(moves, scale, drift, law.Level, levels);
        }
    }
}
