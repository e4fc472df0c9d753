using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing;

/// <summary>
/// An instrument as of one date, with its names resolved to places in the factor list and the currency table: ready to be valued at any
/// levels. Its scalar formula is the twin of the one that values scenarios, so a base value equals a scenario with no move to the last bit.
/// </summary>
/// <param name="currency">Place of its currency in the currency table.</param>
/// <param name="multiplier">Value of one unit held per unit of the formula.</param>
public abstract class BoundInstrument(int currency, double multiplier)
{
    /// <summary>Place of its currency in the currency table.</summary>
    public int Currency { get; } = currency;

    /// <summary>Value of one unit held per unit of the formula.</summary>
    public double Multiplier { get; } = multiplier;

    /// <summary>Last date that it lives on; <see cref="DateOnly.MaxValue"/> where it has none.</summary>
    public DateOnly LastDay { get; init; } = DateOnly.MaxValue;

    /// <summary>What a barrier that was crossed before the date has made of it, as a clause to follow its name; null where none was.</summary>
    public string? CrossedBarrier { get; init; }

    /// <summary>Value of one unit held, in the instrument's currency. NaN where a level that it needs is NaN or allows no value.</summary>
    public double Value(ReadOnlySpan<double> levels) => Multiplier * UnitValue(levels);

    /// <summary>What one unit held stands for in the market: its value, unless it is worth nothing by contract.</summary>
    public virtual double Exposure(ReadOnlySpan<double> levels) => Value(levels);

    /// <summary>What one unit held has been paid between two sets of levels: a future's gain, else 0.</summary>
    public virtual double Settled(ReadOnlySpan<double> before, ReadOnlySpan<double> after) => 0;

    /// <summary>Standard error of <see cref="Value"/> where it is simulated, else 0.</summary>
    public virtual double StandardError(ReadOnlySpan<double> levels) => 0;

    /// <summary>Value before the multiplier.</summary>
    protected abstract double UnitValue(ReadOnlySpan<double> levels);
}

/// <summary>One unit of a currency.</summary>
public sealed class BoundCash(int currency, double multiplier) : BoundInstrument(currency, multiplier)
{
    /// <inheritdoc/>
    protected override double UnitValue(ReadOnlySpan<double> levels) => 1;
}

/// <summary>One unit of an underlying.</summary>
public sealed class BoundSpot(int currency, double multiplier, UnderlyingKey underlying) : BoundInstrument(currency, multiplier)
{
    /// <summary>What is held.</summary>
    public UnderlyingKey Underlying { get; } = underlying;

    /// <inheritdoc/>
    protected override double UnitValue(ReadOnlySpan<double> levels) => Underlying.LevelOf(levels);
}

/// <summary>A futures contract: value 0, profit the change of its price.</summary>
public sealed class BoundFuture(int currency, double multiplier, UnderlyingKey underlying) : BoundInstrument(currency, multiplier)
{
    /// <summary>Its price.</summary>
    public UnderlyingKey Underlying { get; } = underlying;

    /// <inheritdoc/>
    public override double Exposure(ReadOnlySpan<double> levels) => Multiplier * Underlying.LevelOf(levels);

    /// <inheritdoc/>
    public override double Settled(ReadOnlySpan<double> before, ReadOnlySpan<double> after) => Multiplier * (Underlying.LevelOf(after) - Underlying.LevelOf(before));

    /// <inheritdoc/>
    protected override double UnitValue(ReadOnlySpan<double> levels) => 0;
}

/// <summary>A forward at flat rates: the strike leg is a constant, so only <see cref="Units"/> of the underlying move.</summary>
public sealed class BoundForward(int currency, double multiplier, UnderlyingKey underlying, double strike, double years, double rate, double carry) : BoundInstrument(currency, multiplier)
{
    /// <summary>What is bought.</summary>
    public UnderlyingKey Underlying { get; } = underlying;

    /// <summary>e^(-qT): units of the underlying that it holds.</summary>
    public double Units { get; } = Exponential.Of(-carry * years);

    /// <inheritdoc/>
    protected override double UnitValue(ReadOnlySpan<double> levels) => (Underlying.LevelOf(levels) * Units) - (strike * Exponential.Of(-rate * years));
}

/// <summary>A plain European option at flat rates, its volatility flat or that of one factor.</summary>
/// <param name="currency">Place of its currency in the currency table.</param>
/// <param name="multiplier">Value of one unit held per unit of the formula.</param>
/// <param name="underlying">What it is written on.</param>
/// <param name="strike">Strike.</param>
/// <param name="years">Years of 365 days to the close of the expiry.</param>
/// <param name="rate">Continuously compounded discount rate.</param>
/// <param name="carry">Continuously compounded yield of the underlying, q.</param>
/// <param name="isCall">Call, else put.</param>
/// <param name="volatility">Flat volatility; unused where a factor carries it.</param>
/// <param name="volatilityFactor">The factor that carries the volatility, or -1.</param>
public sealed class BoundEuropean(
    int currency, double multiplier, UnderlyingKey underlying, double strike, double years, double rate, double carry, bool isCall, double volatility, int volatilityFactor)
    : BoundInstrument(currency, multiplier)
{
    /// <summary>What it is written on.</summary>
    public UnderlyingKey Underlying { get; } = underlying;

    /// <summary>Years of 365 days to the close of the expiry.</summary>
    public double Years { get; } = years;

    /// <summary>The factor that carries the volatility, or -1.</summary>
    public int VolatilityFactor { get; } = volatilityFactor;

    /// <summary>The terms at today's <paramref name="levels"/> and <paramref name="years"/> to expiry, for scenarios that move the underlying by log-returns.</summary>
    public EuropeanOptionTerms Terms(ReadOnlySpan<double> levels, double years) =>
        new(Underlying.LevelOf(levels), strike, years, VolatilityAt(levels), rate, rate - carry, isCall);

    /// <summary>Value before the multiplier with <paramref name="years"/> to expiry: the flat or the factor's volatility, each by its own kernel.</summary>
    public double ValueWith(ReadOnlySpan<double> levels, double years)
    {
        var (spot, volatility) = (Underlying.LevelOf(levels), VolatilityAt(levels));
        if (!(spot > 0) || !(volatility >= 0)) return double.NaN;
        var terms = Terms(levels, years);
        return VolatilityFactor < 0 ? EuropeanOption.Value(terms, 0, spot) : EuropeanOption.Value(terms, 0, spot, volatility);
    }

    /// <inheritdoc/>
    protected override double UnitValue(ReadOnlySpan<double> levels) => ValueWith(levels, Years);

    private double VolatilityAt(ReadOnlySpan<double> levels) => VolatilityFactor < 0 ? volatility : levels[VolatilityFactor];
}

/// <summary>A bond, floater or swap: a sum of amounts discounted by linear forms in the levels.</summary>
public sealed class BoundFlows(int currency, double multiplier, ExponentialFlow[] flows) : BoundInstrument(currency, multiplier)
{
    /// <summary>The flows, one an exponent.</summary>
    public IReadOnlyList<ExponentialFlow> Flows { get; } = flows;

    /// <summary>Notional that stands behind one unit of a swap, whose value says nothing of its size; null where the value does.</summary>
    public double? Notional { get; init; }

    /// <inheritdoc/>
    public override double Exposure(ReadOnlySpan<double> levels) => Notional ?? Value(levels);

    /// <inheritdoc/>
    protected override double UnitValue(ReadOnlySpan<double> levels) => ExponentialFlow.Sum(flows, levels);
}

/// <summary>Any other option: a formula over the market that it sees up to its expiry.</summary>
/// <param name="currency">Place of its currency in the currency table.</param>
/// <param name="multiplier">Value of one unit held per unit of the formula.</param>
/// <param name="underlying">What it is written on.</param>
/// <param name="market">How rates and volatility follow from the levels.</param>
/// <param name="formulaAt">The formula for scenarios that move from one level of the underlying, which is positive.</param>
public sealed class BoundOption(int currency, double multiplier, UnderlyingKey underlying, MarketTerms market, Func<double, OptionFormula> formulaAt) : BoundInstrument(currency, multiplier)
{
    /// <summary>What it is written on.</summary>
    public UnderlyingKey Underlying { get; } = underlying;

    /// <summary>How rates and volatility follow from the levels.</summary>
    public MarketTerms Market { get; } = market;

    /// <summary>The formula for scenarios that move from <paramref name="spot"/>.</summary>
    public OptionFormula FormulaAt(double spot) => formulaAt(spot);

    /// <inheritdoc/>
    public override double StandardError(ReadOnlySpan<double> levels) =>
        Underlying.LevelOf(levels) is var spot && spot > 0 && formulaAt(spot) is NumericFormula formula
            ? Math.Abs(Multiplier) * formula.ValueWithError(Market.At(levels, 0, spot)).StandardError : 0;

    /// <inheritdoc/>
    protected override double UnitValue(ReadOnlySpan<double> levels)
    {
        var spot = Underlying.LevelOf(levels);
        var point = Market.At(levels, 0, spot);
        return spot > 0 && double.IsFinite(point.Discount + point.Carry + point.Deviation) ? formulaAt(spot).Value(point) : double.NaN;
    }
}
