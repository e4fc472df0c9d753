using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>What an interval lets one say of the difference between two models.</summary>
internal enum Apart
{
    /// <summary>The two intervals have no point in common.</summary>
    Beyond,

    /// <summary>The two intervals meet.</summary>
    Within,

    /// <summary>One of the two claims no interval.</summary>
    Unknown,
}

/// <summary>Two models held against each other on one measure.</summary>
internal static class ModelComparison
{
    /// <summary>Whether two measures lie further apart than their intervals; of a history that of its days as a sample.</summary>
    public static Apart Of(MeasureResult one, MeasureResult other) => (Ends(one), Ends(other)) switch
    {
        ({ } a, { } b) => a.High < b.Low || b.High < a.Low ? Apart.Beyond : Apart.Within,
        _ => Apart.Unknown,
    };

    /// <summary>How many times the figure of the model of record another's is; null where that is no loss.</summary>
    public static double? Ratio(MeasureResult? record, MeasureResult? other) => record is { Value: > 0 } && other is not null ? other.Value / record.Value : null;

    /// <summary>A ratio in a figure's place.</summary>
    public static string Times(double? ratio) => ratio is { } times ? $"{Numerals.Fixed(times, Math.Abs(times) < 9.995 ? 2 : 1)}\u00D7" : "";

    // An end outside the sample bounds nothing.
    private static (double Low, double High)? Ends(MeasureResult measure) => measure.Sample switch
    {
        null => (measure.Low ?? double.NegativeInfinity, measure.High ?? double.PositiveInfinity),
        { Low: null, High: null } => null,
        var sample => (sample.Low ?? double.NegativeInfinity, sample.High ?? double.PositiveInfinity),
    };
}
