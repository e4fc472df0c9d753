using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Models;

namespace RiskWorker.Engine.Calibration;

/// <summary>From observations to the law of the factors' moves. Its bits depend on the snapshot alone.</summary>
public static class Calibrator
{
    /// <summary>Calibrates the model of record of <paramref name="snapshot"/>.</summary>
    /// <exception cref="CalibrationException">The data cannot be used.</exception>
    public static CalibratedModel Calibrate(Snapshot snapshot) => Calibrate(snapshot, ShockTable.From(snapshot));

    /// <summary>The same with the snapshot's <paramref name="table"/> of shocks, where it is at hand.</summary>
    /// <exception cref="CalibrationException">The data cannot be used.</exception>
    public static CalibratedModel Calibrate(Snapshot snapshot, ShockTable table) =>
        Calibrate(snapshot, table, snapshot.Settings.Model, snapshot.Settings.Measures.Select(m => m.Horizon.Days).Append(1).Max());

    /// <summary>Calibrates any model but a stressed one, whose span has to be found first.</summary>
    /// <param name="snapshot">Factors and given covariances.</param>
    /// <param name="table">The snapshot's shocks.</param>
    /// <param name="model">The model.</param>
    /// <param name="longest">The longest horizon in days.</param>
    /// <param name="lastDay">Shocks after it are left out; null where none is. Levels are today's whatever it is.</param>
    /// <param name="isAroundMean">Whether covariances of complete days are taken around the mean instead of zero: no setting, tried to show what it does.</param>
    /// <exception cref="CalibrationException">The data cannot be used.</exception>
    public static CalibratedModel Calibrate(Snapshot snapshot, ShockTable table, ModelSettings model, int longest, DateOnly? lastDay = null, bool isAroundMean = false)
    {
        var factors = snapshot.Factors;
        var (complete, parameters) = (CompleteDays(table, model, longest, lastDay), new List<ModelParameter>());
        if (complete is not null) RequirePositivePrices(table, complete);
        var last = LastObservations(table);
        var jumps = model is { Kind: ModelKind.JumpDiffusion, Jumps.AreGiven: false } && complete is not null ? JumpEstimation.Of(model, complete, factors.Count) : null;
        var paired = model.MissingDays == MissingDays.Pairwise && model.Covariance != CovarianceEstimator.Given && factors.Count > 0 ? ShockWindow.Observed(table, model.Window, lastDay) : null;
        if (paired is not null) RequirePositivePrices(table, paired);
        var covariance = model.Covariance switch
        {
            CovarianceEstimator.Given => GivenCovariance.Of(snapshot.Covariance, factors),
            _ when paired is not null => CovarianceEstimation.Pairwise(model, paired, factors.Count, factors, parameters),
            _ when complete is null => [],
            _ => CovarianceEstimation.Of(model, jumps?.Quiet ?? complete.Shocks, factors.Count, isAroundMean, parameters),
        };
        var window = paired ?? complete;
        var correlation = MovingCorrelation.Of(covariance, factors.Count);
        return new()
        {
            Factors = factors,
            Levels = [.. last.Select((t, j) => table.Values(j)[t])],
            LevelDates = [.. last.Select(t => table.Dates[t])],
            Deviations = correlation.Deviations,
            DailyDrift = Drift.Daily(model, factors, correlation.Deviations, complete),
            Moving = correlation.Order,
            Ages = model.Ages,
            Law = ScenarioLaws.Of(model, complete, jumps, factors, correlation.Order, correlation.Deviations, longest),
            Rank = correlation.Factor.Rank,
            Lower = correlation.Factor.Lower,
            RepairDistance = correlation.RepairDistance,
            Parameters = parameters,
            Shocks = model.Covariance != CovarianceEstimator.Given ? window?.Days.Count ?? 0 : 0,
            From = window?.Days[0],
            To = window?.Days[^1],
            DroppedDays = window?.Dropped ?? [],
            DropCauses = window?.DropCauses ?? [],
            Proxies = window is null ? [] : Proxies(factors, window),
            Adjustments = Adjustments(table, window, last),
            ClosedDayObservations = Enumerable.Range(0, factors.Count).Sum(table.ClosedDayObservations),
        };
    }

    /// <summary>The complete days that something is estimated from; null where nothing is.</summary>
    private static ShockWindow? CompleteDays(ShockTable table, ModelSettings model, int longest, DateOnly? lastDay)
    {
        if (table.Factors.Count == 0) return null;
        var forCovariance = model.Covariance != CovarianceEstimator.Given && model.MissingDays == MissingDays.Complete;
        if (!forCovariance && !Drift.NeedsShocks(model) && !ScenarioLaws.NeedShocks(model)) return null;
        // So that every horizon has as many scenarios as the window has days.
        return ShockWindow.Newest(table, model.Kind == ModelKind.Historical ? model.Window + longest - 1 : model.Window, lastDay);
    }

    /// <summary>Index of the date of each factor's level.</summary>
    private static int[] LastObservations(ShockTable table)
    {
        var last = new int[table.Factors.Count];
        for (var j = 0; j < last.Length; j++)
        {
            last[j] = table.LastObserved(j);
            if (last[j] < 0) throw new CalibrationException(table.Factors[j].Name, "It has no observation on an open day of its calendar.");
            RequirePositive(table, j, last[j]);
        }
        return last;
    }

    private static void RequirePositivePrices(ShockTable table, ShockWindow window)
    {
        for (var j = 0; j < table.Factors.Count; j++)
        {
            for (var t = FirstUsed(table, window, j); t < table.Dates.Length; t++) RequirePositive(table, j, t);
        }
    }

    private static void RequirePositive(ShockTable table, int factor, int t)
    {
        if (table.Factors[factor].Shock == ShockKind.Lognormal && table.Values(factor)[t] <= 0)
            throw new CalibrationException(table.Factors[factor].Name, $"Its value on {table.Dates[t]:yyyy-MM-dd} is {table.Values(factor)[t]:r}; a factor with lognormal shocks must be positive.");
    }

    /// <summary>Index of the oldest value of the factor that the window reads: that of the business day before its first day.</summary>
    private static int FirstUsed(ShockTable table, ShockWindow window, int factor) =>
        table.Previous(factor, window.First) is var before and >= 0 ? before : window.First;

    private static UsedProxy[] Proxies(IReadOnlyList<Factor> factors, ShockWindow window) =>
        [.. factors.Select((factor, j) => (factor, days: window.Filled[j]))
            .Where(f => f.days > 0)
            .Select(f => new UsedProxy(f.factor.Name, f.factor.Proxy!, f.factor.Beta!.Value, f.days, (double)f.days / window.Days.Count))];

    private static AppliedAdjustment[] Adjustments(ShockTable table, ShockWindow? window, int[] last) =>
        [.. table.Factors.SelectMany((factor, j) =>
            table.History.Applied(factor.Name, table.Dates[window is null ? last[j] : Math.Min(last[j], FirstUsed(table, window, j))]))];
}
