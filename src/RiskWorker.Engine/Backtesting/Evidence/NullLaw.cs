namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>The law of a statistic under the model: large values speak against it.</summary>
/// <remarks>Values within 1e-9 of one another, relative to the larger of 1 and their size, are ties: rounding must not take an observation out of its own tail.</remarks>
internal sealed class NullLaw
{
    private const double Tie = 1e-9;

    private readonly double[] _values; // ascending
    private readonly double[] _tails;  // the probability of that value or a later one

    private NullLaw(double[] values, double[] tails, bool isExact) => (_values, _tails, IsExact) = (values, tails, isExact);

    /// <summary>False where the law was simulated.</summary>
    public bool IsExact { get; }

    /// <summary>Values with their probabilities, in any order; both arrays are sorted in place.</summary>
    public static NullLaw Exact(double[] values, double[] probabilities)
    {
        Array.Sort(values, probabilities);
        var sum = 0.0;
        for (var i = probabilities.Length - 1; i >= 0; i--) probabilities[i] = sum += probabilities[i];
        return new(values, probabilities, true);
    }

    /// <summary>Simulated values in any order, sorted in place: the tail of an observation counts itself among them (Davison and Hinkley, Bootstrap Methods, 1997, section 4.2).</summary>
    public static NullLaw Simulated(double[] values)
    {
        Array.Sort(values);
        var tails = new double[values.Length];
        for (var i = 0; i < tails.Length; i++) tails[i] = (values.Length - i + 1.0) / (values.Length + 1.0);
        return new(values, tails, false);
    }

    /// <summary>The probability of <paramref name="statistic"/> or more.</summary>
    public double AtLeast(double statistic)
    {
        var least = Lowered(statistic);
        var (low, high) = (0, _values.Length);
        while (low < high)
        {
            var middle = (low + high) >>> 1;
            if (_values[middle] < least) low = middle + 1; else high = middle;
        }
        return low < _values.Length ? Math.Min(_tails[low], 1) : IsExact ? 0 : 1.0 / (_values.Length + 1);
    }

    /// <summary>The probability of a value whose tail is at most <paramref name="level"/>: what a test at that level attains.</summary>
    public double SizeAt(double level)
    {
        var size = 0.0;
        for (var i = _values.Length - 1; i >= 0 && AtLeast(_values[i]) <= level; i--) size = _tails[i];
        return size;
    }

    private static double Lowered(double statistic) => statistic - (Tie * Math.Max(1, Math.Abs(statistic)));
}
