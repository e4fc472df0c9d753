using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Backtesting;

/// <summary>
/// The factors' levels at the close of any date of a snapshot: of each factor the newest observation up to then on an open day of its
/// calendar. Those of the as-of date are the calibrated model's to the last bit.
/// </summary>
public sealed class ClosingLevels : IPastLevels
{
    private readonly ObservationHistory _history;
    private readonly int[] _columns;
    private readonly BusinessCalendar[] _calendars;
    private readonly Adjustment[][] _adjustments;

    /// <summary>Takes factors, observations and adjustments from <paramref name="snapshot"/>.</summary>
    public ClosingLevels(Snapshot snapshot)
    {
        _history = snapshot.Observations;
        _columns = [.. snapshot.Factors.Select(f => snapshot.Observations.ColumnOf(f.Name))];
        var byFactor = snapshot.Adjustments.ToLookup(a => a.Factor, StringComparer.Ordinal);
        _adjustments = [.. snapshot.Factors.Select(f => byFactor[f.Name].OrderByDescending(a => a.Date).ThenBy(a => a.Ratio).ToArray())];
        var calendars = BusinessCalendar.ByName(snapshot.Holidays);
        _calendars = [.. snapshot.Factors.Select(f => calendars.GetValueOrDefault(f.Calendar ?? "", BusinessCalendar.Weekdays))];
    }

    /// <summary>Level of every factor at the close of <paramref name="date"/>, in the snapshot's order; NaN where it was never observed until then.</summary>
    public double[] At(DateOnly date) => At(date, date);

    /// <summary>
    /// The same in the terms of another date: a split or roll between the two is undone, so that a holding of
    /// <paramref name="basis"/> is valued per unit as it was held. Quantities and strikes of that date stand beside it unchanged.
    /// </summary>
    public double[] At(DateOnly date, DateOnly basis)
    {
        var row = _history.IndexOf(date);
        if (row < 0) row = ~row - 1;
        var levels = new double[_columns.Length];
        for (var j = 0; j < levels.Length; j++) levels[j] = _columns[j] < 0 ? double.NaN : Level(j, row, basis);
        return levels;
    }

    /// <inheritdoc/>
    public double On(UnderlyingKey underlying, DateOnly date, DateOnly basis)
    {
        if (_history.IndexOf(date) is var row && row < 0) return double.NaN;
        if (!underlying.IsCross) return ObservedOn(underlying.Factor, row, basis);
        return (underlying.Factor < 0 ? 1 : ObservedOn(underlying.Factor, row, basis)) / (underlying.Quote < 0 ? 1 : ObservedOn(underlying.Quote, row, basis));
    }

    /// <inheritdoc/>
    public IEnumerable<DateOnly> Dates(DateOnly from, DateOnly to)
    {
        for (var row = _history.IndexOf(from) is var found && found < 0 ? ~found : found; row < _history.Count && _history.Dates[row] <= to; row++) yield return _history.Dates[row];
    }

    private double ObservedOn(int factor, int row, DateOnly basis) =>
        _columns[factor] < 0 || double.IsNaN(_history.Column(_columns[factor])[row]) ? double.NaN : Level(factor, row, basis);

    private double Level(int factor, int row, DateOnly basis)
    {
        var column = _history.Column(_columns[factor]);
        while (row >= 0 && (double.IsNaN(column[row]) || !_calendars[factor].IsOpen(_history.Dates[row]))) row--;
        if (row < 0) return double.NaN;
        var (observed, up, down) = (_history.Dates[row], 1.0, 1.0);
        foreach (var adjustment in _adjustments[factor])
        {
            if (observed < adjustment.Date && adjustment.Date <= basis) up *= adjustment.Ratio;
            else if (basis < adjustment.Date && adjustment.Date <= observed) down *= adjustment.Ratio;
        }
        return column[row] * up / down;
    }
}
