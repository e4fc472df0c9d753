using System.Globalization;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.Verbs;

/// <summary>Figures as the terminal shows them.</summary>
public static class Figures
{
    /// <summary>Money: thousands separated, cents only below a thousand; '-' for none.</summary>
    public static string Money(double? amount) => amount is not { } value ? "-"
        : value.ToString(Math.Abs(value) < 999.995 ? "N2" : "N0", CultureInfo.InvariantCulture);

    /// <summary>A share as a percentage with one decimal; '-' for none.</summary>
    public static string Share(double? share) => share is { } value ? (value * 100).ToString("N1", CultureInfo.InvariantCulture) + "%" : "-";

    /// <summary>An interval; an end outside the sample is '…'.</summary>
    public static string Interval(double? low, double? high) => low is null && high is null ? "-" : $"{End(low)} to {End(high)}";

    /// <summary>The interval of a measure; of a history what its days allow as a sample, for the measure itself has no noise.</summary>
    public static string Interval(MeasureResult measure)
    {
        ArgumentNullException.ThrowIfNull(measure);
        return measure.Sample is { } sample ? Interval(sample.Low, sample.High) : Interval(measure.Low, measure.High);
    }

    /// <summary>A whole number with its thousands separated.</summary>
    public static string Count(long number) => number.ToString("N0", CultureInfo.InvariantCulture);

    /// <summary>As in 'VaR 99% 10d'.</summary>
    public static string Measure(MeasureSpec spec) => $"{(spec.Kind switch { MeasureKind.Var => "VaR", MeasureKind.Es => "ES", _ => "LES" })} {spec.Confidence} {spec.Horizon.Days}d";

    /// <summary>As in '2026-11-27'.</summary>
    public static string Date(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    private static string End(double? amount) => amount is null ? "…" : Money(amount);
}
