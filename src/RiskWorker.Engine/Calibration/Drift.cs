using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Calibration;

/// <summary>The expected shock of a day, of 252 in a year: of the logarithm for a lognormal factor, of the value for a normal one.</summary>
internal static class Drift
{
    private const double DaysPerYear = 252;

    /// <summary>Whether the drift is read from the shocks.</summary>
    public static bool NeedsShocks(ModelSettings model) => model.Drift == DriftKind.Historical;

    /// <summary>Drift of each factor; <paramref name="window"/> is read for <see cref="DriftKind.Historical"/> alone.</summary>
    /// <exception cref="CalibrationException">A drift is given for a factor that does not exist.</exception>
    public static double[] Daily(ModelSettings model, IReadOnlyList<Factor> factors, double[] deviations, ShockWindow? window)
    {
        var drift = new double[factors.Count];
        if (model.Drift == DriftKind.Historical)
        {
            for (var j = 0; j < drift.Length; j++) drift[j] = LaneSum.Of(window!.Row(j)) / window.Days.Count;
            return drift;
        }
        var yearly = model.Drift == DriftKind.Explicit ? Yearly(model, factors) : drift;
        for (var j = 0; j < drift.Length; j++)
        {
            // The arithmetic return grows at the yearly rate: E[S(h)] = S(0) e^(mu h), so the logarithm gives up half its variance.
            var spread = factors[j].Shock == ShockKind.Lognormal ? deviations[j] * deviations[j] / 2 : 0;
            drift[j] = (yearly[j] / DaysPerYear) - spread;
        }
        return drift;
    }

    private static double[] Yearly(ModelSettings model, IReadOnlyList<Factor> factors)
    {
        foreach (var name in model.Drifts.Keys)
        {
            if (!factors.Any(f => f.Name == name)) throw new CalibrationException(name, $"The model '{model.Name}' gives a drift for it, but it is not among the factors.");
        }
        return [.. factors.Select(f => model.Drifts.TryGetValue(f.Name, out var value) ? value : 0)];
    }
}
