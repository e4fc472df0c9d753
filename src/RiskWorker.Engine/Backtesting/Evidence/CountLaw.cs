namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>Probabilities of the number of exceptions in independent days, from the ratios of neighbours: what lies below 1e-300 of the likeliest is left out.</summary>
internal sealed class CountLaw
{
    private const double Negligible = 1e-300;

    private readonly double[] _probabilities;

    public CountLaw(int days, decimal exception)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(days, 1);
        var odds = (double)exception / (double)(1 - exception);
        var mode = (int)Math.Min(days, decimal.Floor((days + 1m) * exception));
        var below = new List<double>();
        for (var (k, w) = (mode, 1.0); k > 0 && (w *= k / ((days - k + 1) * odds)) > Negligible; k--) below.Add(w);
        var above = new List<double>();
        for (var (k, w) = (mode, 1.0); k < days && (w *= (double)(days - k) / (k + 1) * odds) > Negligible; k++) above.Add(w);
        First = mode - below.Count;
        below.Reverse();
        _probabilities = [.. below, 1.0, .. above];
        var total = _probabilities.Order().Sum();
        for (var i = 0; i < _probabilities.Length; i++) _probabilities[i] /= total;
    }

    /// <summary>The fewest exceptions that are not left out.</summary>
    public int First { get; }

    /// <summary>The most.</summary>
    public int Last => First + _probabilities.Length - 1;

    /// <summary>P(count = <paramref name="count"/>).</summary>
    public double this[int count] => count < First || count > Last ? 0 : _probabilities[count - First];
}
