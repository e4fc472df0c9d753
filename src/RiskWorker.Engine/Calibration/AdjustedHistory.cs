using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Calibration;

/// <summary>
/// Observations up to a date with splits and rolls applied: a value before an adjustment's date is multiplied by its ratio, by the
/// product of the ratios where several follow (multiplied from the newest back). Adjustments after the date do not exist yet.
/// </summary>
public sealed class AdjustedHistory
{
    private readonly ObservationHistory _history;
    private readonly Dictionary<string, Adjustment[]> _adjustments;

    /// <summary>Adjusts <paramref name="history"/> as known at the close of <paramref name="asOf"/>.</summary>
    public AdjustedHistory(ObservationHistory history, IReadOnlyList<Adjustment> adjustments, DateOnly asOf)
    {
        _history = history.UpTo(asOf);
        _adjustments = adjustments.Where(a => a.Date <= asOf)
            .GroupBy(a => a.Factor, StringComparer.Ordinal)
            .ToDictionary(g => g.Key, g => g.OrderByDescending(a => a.Date).ThenBy(a => a.Ratio).ToArray(), StringComparer.Ordinal);
    }

    /// <summary>The dates, ascending.</summary>
    public ReadOnlySpan<DateOnly> Dates => _history.Dates;

    /// <summary>A new array of the factor's adjusted values, one a date, NaN where nothing was observed.</summary>
    public double[] Values(string factor)
    {
        var column = _history.ColumnOf(factor);
        if (column < 0)
        {
            var nothing = new double[Dates.Length];
            Array.Fill(nothing, double.NaN);
            return nothing;
        }
        var values = _history.Column(column).ToArray();
        if (_adjustments.TryGetValue(factor, out var adjustments)) Apply(adjustments, values);
        return values;
    }

    /// <summary>The adjustments that changed the factor's values from the date <paramref name="earliest"/> on, by date.</summary>
    public IEnumerable<AppliedAdjustment> Applied(string factor, DateOnly earliest) =>
        _adjustments.TryGetValue(factor, out var adjustments)
            ? adjustments.Where(a => a.Date > earliest).Reverse().Select(a => new AppliedAdjustment(a.Factor, a.Date, a.Ratio, a.Reason))
            : [];

    private void Apply(Adjustment[] newestFirst, double[] values)
    {
        var (ratio, next) = (1.0, 0);
        for (var t = values.Length - 1; t >= 0; t--)
        {
            while (next < newestFirst.Length && Dates[t] < newestFirst[next].Date) ratio *= newestFirst[next++].Ratio;
            if (next > 0) values[t] *= ratio;
        }
    }
}
