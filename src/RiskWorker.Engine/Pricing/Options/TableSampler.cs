using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>Prices the points that a table goes through or is held against, with what is found once for a set of rates and a volatility kept.</summary>
internal sealed class TableSampler(NumericFormula formula, double spot0, MovingInputs inputs)
{
    // The table's error is to stay below this part of the spot, and of a simulated price's standard error; rounding sets the last.
    // A simulated price is rough in the spot by up to about half its standard error, which no polynomial follows or should.
    private const double PartOfSpot = 1e-7, PartOfStandardError = 0.5, PartOfValue = 1e-9;

    private readonly Dictionary<(double, double, double), SpotPrices> _markets = [];
    private double _largest;

    /// <summary>How many sets of rates and volatility have been asked for.</summary>
    public int Markets => _markets.Count;

    /// <summary>The largest standard error met.</summary>
    public double StandardError { get; private set; }

    /// <summary>The error that is good enough, going by the prices met so far.</summary>
    public double Tolerance => Math.Max(Math.Max(PartOfSpot * spot0, PartOfValue * _largest), PartOfStandardError * StandardError);

    /// <summary>The log-return at which the option is best exercised; null where there is none.</summary>
    public double? Boundary(ReadOnlySpan<double> z) => Market(z).ExerciseSpot is { } spot ? Logarithm.Of(spot / spot0) : null;

    /// <summary>What exercise brings at a log-return.</summary>
    public double Exercised(EarlyExercise exercise, double x) => exercise.Sign * ((spot0 * Exponential.Of(x)) - exercise.Strike);

    /// <summary>Prices at log-returns, under the rates and the volatility of a point.</summary>
    public void Price(ReadOnlySpan<double> z, ReadOnlySpan<double> x, Span<double> values)
    {
        var (spots, errors) = (new double[x.Length], new double[x.Length]);
        for (var i = 0; i < x.Length; i++) spots[i] = spot0 * Exponential.Of(x[i]);
        Market(z).Price(spots, values, errors);
        for (var i = 0; i < x.Length; i++)
        {
            if (!double.IsFinite(values[i])) throw new ArithmeticException($"The price at spot {spots[i]:R} is {values[i]}; a table needs finite prices.");
            _largest = Math.Max(_largest, Math.Abs(values[i]));
            StandardError = Math.Max(StandardError, errors[i]);
        }
    }

    private SpotPrices Market(ReadOnlySpan<double> z)
    {
        var at = inputs.At(z);
        if (!_markets.TryGetValue(at, out var market)) _markets[at] = market = formula.At(at.Discount, at.Carry, at.Deviation);
        return market;
    }
}
