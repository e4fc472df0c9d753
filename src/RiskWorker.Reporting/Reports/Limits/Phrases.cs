using System.Globalization;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The words that sections share, so that one thing is called by one name.</summary>
internal static class Phrases
{
    private static readonly string[] Words =
        ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve", "thirteen", "fourteen", "fifteen", "sixteen", "seventeen", "eighteen", "nineteen", "twenty"];

    /// <summary>A count in words up to twenty.</summary>
    public static string Number(int count) => count < Words.Length ? Words[count] : Numerals.Count(count);

    /// <summary>A count in figures with its noun, which takes an s.</summary>
    public static string Plural(int count, string noun) => $"{Numerals.Count(count)} {noun}{(count == 1 ? "" : "s")}";

    /// <summary>The text with a capital letter at its start.</summary>
    public static string Sentence(string text) => char.ToUpperInvariant(text[0]) + text[1..];

    public static string Word(LimitStatus status) => status switch
    {
        LimitStatus.Breached => "breached",
        LimitStatus.Inconclusive => "inconclusive",
        LimitStatus.Warning => "warning",
        _ => "within",
    };

    public static StatusMark Mark(LimitStatus status) => status switch
    {
        LimitStatus.Breached => StatusMark.Bad,
        LimitStatus.Inconclusive => StatusMark.Undecided,
        LimitStatus.Warning => StatusMark.Warning,
        _ => StatusMark.Good,
    };

    /// <summary>The order in which a reader wants to see them: what must be acted on first.</summary>
    public static int Urgency(LimitStatus status) => status switch
    {
        LimitStatus.Breached => 0,
        LimitStatus.Inconclusive => 1,
        LimitStatus.Warning => 2,
        _ => 3,
    };

    public static string Word(RunStatus status) => status switch
    {
        RunStatus.Complete => "complete",
        RunStatus.Degraded => "degraded",
        _ => "failed",
    };

    public static StatusMark Mark(RunStatus status) => status switch
    {
        RunStatus.Complete => StatusMark.Good,
        RunStatus.Degraded => StatusMark.Warning,
        _ => StatusMark.Bad,
    };

    public static (StatusMark Mark, string Word) Zone(BacktestZone? zone) => zone switch
    {
        BacktestZone.Green => (StatusMark.Good, "green"),
        BacktestZone.Yellow => (StatusMark.Warning, "yellow"),
        BacktestZone.Red => (StatusMark.Bad, "red"),
        _ => (StatusMark.None, "too\u00A0few\u00A0days"),
    };

    /// <summary>What a limit binds: book and measure. A name that seems to hold the book's is no reason to leave it out: a book may be called 'A'.</summary>
    public static string Bound(RunReading run, LimitResult limit) => $"{run.NameOf(limit.Limit.Book)}, {limit.Limit.Measure}";

    /// <summary>A measure without its horizon: VaR 99%.</summary>
    public static string Short(MeasureSpec spec) => spec.Kind switch { MeasureKind.Var => $"VaR {spec.Confidence}", MeasureKind.Es => $"ES {spec.Confidence}", _ => $"LES {spec.Confidence}" };

    /// <summary>A measure as a column's head: the horizon stays on one line.</summary>
    public static string Head(MeasureSpec spec) => $"{Short(spec)}, {spec.Horizon.ToString().Replace(' ', '\u00A0')}";

    /// <summary>An interval of money: 313.1 to 319.4; an end outside the sample is named.</summary>
    public static string Interval(MoneyScale scale, double? low, double? high) =>
        (low, high) is (null, null) ? "interval outside the sample" : $"{Ends(low, scale.Text)} to {Ends(high, scale.Text)}";

    /// <summary>The interval of a measure of the model of record; of a history that of its days as a sample, which <see cref="Head(RunReading, string)"/> says, and nothing where no figure of the run has one.</summary>
    public static string Interval(RunReading run, MoneyScale scale, MeasureResult measure) => measure.Sample switch
    {
        null => Interval(scale, measure.Low, measure.High),
        { Low: null, High: null } => run.IsWeighted ? "" : "no interval",
        var sample => Interval(scale, sample.Low, sample.High),
    };

    /// <summary>The unit of a column of measures, and what stands below them where that is no simulation noise.</summary>
    public static string Head(RunReading run, string unit) => run.IsHistory && !run.IsWeighted ? $"{unit}{(unit.Length > 0 ? "; " : "")}below: sample" : unit;

    /// <summary>An interval of utilisation.</summary>
    public static string UsedInterval(double? low, double? high) =>
        (low, high) is (null, null) ? "" : $"{Ends(low, Used)} to {Ends(high, Used)}";

    public static string Used(double? used) => Numerals.Percent(used ?? double.NaN, 1);

    public static string Level(double level) => Numerals.Confidence(Math.Round((decimal)level, 6));

    /// <summary>Words and a date that stay on one line.</summary>
    public static string Since(DateOnly? date) => date is { } day ? $"since\u00A0{Numerals.Date(day)}" : "";

    /// <summary>A moment of the record, to the second.</summary>
    public static string Utc(DateTimeOffset moment) =>
        moment.ToUniversalTime().ToString("yyyy-MM-dd HH:mm:ss", CultureInfo.InvariantCulture) + " UTC";

    /// <summary>From one moment to another, the date said once where it is the same.</summary>
    public static string Utc(DateTimeOffset from, DateTimeOffset to)
    {
        var (first, last) = (Utc(from), Utc(to));
        return first[..10] == last[..10] ? $"{first[..19]} to {last[11..]}" : $"{first} to {last}";
    }

    private static string Ends(double? end, Func<double?, string> text) => end is null ? "beyond the sample" : text(end);
}
