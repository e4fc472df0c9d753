namespace RiskWorker.Numerics.Statistics;

/// <summary>
/// Mean, standard deviation and lag-1 autocorrelation of a series, in passes over it: the mean is corrected by the mean of what it
/// leaves, and deviations are taken from the mean and from what it still leaves. A NaN makes all of them NaN.
/// </summary>
public readonly record struct Moments
{
    private readonly double _squares;
    private readonly double _products;

    private Moments(int count, double mean, double squares, double products)
    {
        Count = count;
        Mean = mean;
        _squares = squares;
        _products = products;
    }

    /// <summary>Number of values, n.</summary>
    public int Count { get; }

    /// <summary>Arithmetic mean; NaN for an empty series.</summary>
    public double Mean { get; }

    /// <summary>Standard deviation with divisor n - 1; NaN below two values.</summary>
    public double SampleDeviation => Count > 1 ? Math.Sqrt(_squares / (Count - 1)) : double.NaN;

    /// <summary>Standard deviation with divisor n; NaN for an empty series.</summary>
    public double PopulationDeviation => Math.Sqrt(_squares / Count);

    /// <summary>Σ_{i≥2} (y_i - m)(y_{i-1} - m) / Σ (y_i - m)²; NaN for a constant series.</summary>
    public double LagOneAutocorrelation => _products / _squares;

    /// <summary>The moments of <paramref name="values"/>, summed in their order.</summary>
    public static Moments Of(ReadOnlySpan<double> values)
    {
        var rough = MeanLeft(values, 0);
        var mean = rough + MeanLeft(values, rough);
        var rest = MeanLeft(values, mean); // what no double next to a large mean can say
        var (squares, products, previous) = (0.0, 0.0, 0.0);
        foreach (var value in values)
        {
            var deviation = value - mean - rest;
            squares += deviation * deviation;
            products += deviation * previous;
            previous = deviation;
        }
        return new(values.Length, mean, squares, products);
    }

    private static double MeanLeft(ReadOnlySpan<double> values, double centre)
    {
        var sum = 0.0;
        foreach (var value in values) sum += value - centre;
        return sum / values.Length;
    }
}
