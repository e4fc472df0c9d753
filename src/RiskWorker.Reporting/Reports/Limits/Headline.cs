using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The top of page 1: one sentence in plain words, then the few figures that it rests on.</summary>
internal static class Headline
{
    private const int Named = 4;

    public static IEnumerable<Block> Blocks(RunReading run)
    {
        yield return new Heading("Daily limit report", 1, Subject(run));
        var urgent = run.Results.Limits.Where(limit => Phrases.Urgency(limit.Status) < 2).OrderBy(limit => Phrases.Urgency(limit.Status))
            .ThenByDescending(limit => limit.Used ?? double.PositiveInfinity).ToList();
        yield return new Callout(Mark(run.Results.Limits), Sentence(run), [.. Details(run, urgent), RunLine(run.Record)]);
        yield return new KeyFigures([.. Figures(run)]);
    }

    /// <summary>Whom and which date a report is about.</summary>
    public static RichText Subject(RunReading run) => RichText.Of(
        new TextRun(run.FirmName.Length > 0 ? run.FirmName + " · as of " : "As of "), new TextRun(Numerals.Date(run.Record.AsOf), Strong: true));

    private static StatusMark Mark(IReadOnlyList<LimitResult> limits) =>
        limits.Count == 0 ? StatusMark.None : Phrases.Mark(limits.MinBy(limit => Phrases.Urgency(limit.Status))!.Status);

    private static string Sentence(RunReading run)
    {
        var limits = run.Results.Limits;
        var breached = limits.Count(limit => limit.Status == LimitStatus.Breached);
        var undecided = limits.Count(limit => limit.Status == LimitStatus.Inconclusive);
        var near = limits.Count(limit => limit.Status == LimitStatus.Warning);
        var all = $"of {Phrases.Number(limits.Count)} limits";
        if (limits.Count == 0)
            return $"No limit is in force on {Numerals.Date(run.Record.AsOf)}.";
        if (limits.Count == 1)
            return Alone(run, limits[0]);
        if (breached > 0)
            return Phrases.Sentence($"{(breached == limits.Count ? Every(breached) : $"{Phrases.Number(breached)} {all}")} {Is(breached)} breached{Undecided(undecided)}{Age(run)}.");
        if (undecided > 0)
            return Phrases.Sentence($"{Phrases.Number(undecided)} {all} {Is(undecided)} undecided within simulation noise; none is breached.");
        return near > 0
            ? Phrases.Sentence($"none {all} is breached; {Phrases.Number(near)} {(near == 1 ? "has" : "have")} reached the warning level.")
            : Phrases.Sentence($"none {all} is breached or near its warning level.");
    }

    private static string Alone(RunReading run, LimitResult limit) => limit.Status switch
    {
        LimitStatus.Breached => $"The only limit is breached{Since(run, limit)}.",
        LimitStatus.Inconclusive => "The only limit is undecided within simulation noise.",
        LimitStatus.Warning => "The only limit is not breached, but has reached its warning level.",
        _ => "The only limit is neither breached nor near its warning level.",
    };

    private static string Undecided(int undecided) => undecided == 0 ? "" : $", {Phrases.Number(undecided)} {Is(undecided)} undecided";

    // Only a run that has a predecessor can say what is new.
    private static string Age(RunReading run)
    {
        var breached = run.Results.Limits.Where(limit => limit.Status == LimitStatus.Breached).ToList();
        var fresh = breached.Count(limit => IsNew(run, limit));
        if (run.Record.Previous is null || breached.Any(limit => limit.StatusSince is null))
            return "";
        if (fresh == 0)
            return breached.Count == 1 ? Since(run, breached[0]) : "; none of these breaches is new";
        return fresh == breached.Count
            ? (fresh == 1 ? "; the breach is new" : "; all these breaches are new")
            : $"; {Phrases.Number(fresh)} of these breaches {Is(fresh)} new";
    }

    private static bool IsNew(RunReading run, LimitResult limit) =>
        run.Record.Previous is not null && limit.StatusSince == run.Record.AsOf;

    private static string Since(RunReading run, LimitResult limit) =>
        limit.StatusSince is { } since && since < run.Record.AsOf ? $", since {Numerals.Date(since)}" : "";

    private static IEnumerable<RichText> Details(RunReading run, List<LimitResult> urgent)
    {
        foreach (var limit in urgent.Take(Named))
        {
            var interval = UsedInterval(run, limit);
            var used = limit.Used is null ? "its use could not be computed" : $"{Phrases.Used(limit.Used)} used{(interval.Length > 0 ? $" ({interval})" : "")}";
            yield return RichText.Of(
                new TextRun(limit.Limit.Name, Strong: true),
                new TextRun($" ({Phrases.Bound(run, limit)}): {Phrases.Word(limit.Status)}{(IsNew(run, limit) ? ", new" : Since(run, limit))}, {used}."));
        }

        if (urgent.Count > Named)
            yield return $"{Phrases.Sentence(Phrases.Number(urgent.Count - Named))} more in the table of limits.";
    }

    private static RichText RunLine(RunRecord record)
    {
        var found = record.Results.Findings.Count;
        var state = record.Status == RunStatus.Complete
            ? " run: no check found anything."
            : $" run: {Phrases.Plural(found, "warning")} of the checks travel{(found == 1 ? "s" : "")} with these figures.";
        var late = record.Evidence == EvidenceKind.Backfilled ? " It was made afterwards (backfilled): nobody had these figures on their date." : "";
        return RichText.Of(new TextRun(Phrases.Sentence(Phrases.Word(record.Status)), Strong: true), new TextRun(state + late));
    }

    private static IEnumerable<KeyFigure> Figures(RunReading run)
    {
        var most = run.Results.Limits.Where(limit => limit.Used is not null).MaxBy(limit => limit.Used);
        if (most is not null)
            yield return new("Most used limit", Phrases.Used(most.Used), "", string.Join(", ", ((string[])[most.Limit.Name, UsedInterval(run, most)]).Where(part => part.Length > 0)), Phrases.Mark(most.Status));
        foreach (var spec in run.HeadlineSpecs)
            yield return Measure(run, spec);
        if (run.Results.Backtest.FirstOrDefault(count => count.Book == run.Root?.Book && count.Days > 0) is { } backtest)
            yield return Exceptions(backtest);
    }

    private static KeyFigure Measure(RunReading run, MeasureSpec spec)
    {
        var scale = run.Scale();
        var measure = RunReading.Find(run.Root!.Measures, spec)!;
        var detail = measure.Sample switch
        {
            null => $"{Phrases.Level(measure.Level)} interval {Phrases.Interval(scale, measure.Low, measure.High)}",
            { Low: null, High: null } => "no sample interval is claimed",
            var sample => $"{Phrases.Level(measure.Level)} interval of the days as a sample {Phrases.Interval(scale, sample.Low, sample.High)}",
        };
        if (RunReading.Find(run.PreviousOf(run.Root)?.Measures, spec) is { } before)
            detail += $"; {scale.Change(measure.Value - before.Value)} since {Numerals.Date(run.Record.Previous!.AsOf)}";
        return new(spec.ToString(), scale.Text(measure.Value), scale.Unit, detail);
    }

    // The value of a history is no draw: its interval would be the value twice.
    private static string UsedInterval(RunReading run, LimitResult limit) => run.IsHistory ? "" : Phrases.UsedInterval(limit.UsedLow, limit.UsedHigh);

    private static KeyFigure Exceptions(BacktestResult count)
    {
        var (mark, word) = Phrases.Zone(count.Zone);
        var actual = count.Actual is { } days ? $"actual {Numerals.Count(days)}" : "no actual P&L";
        var zone = count.Zone is null ? word : $"zone {word}";
        return new(
            $"Exceptions in {Phrases.Plural(count.Days, "day")}", Numerals.Count(count.Exceptions), "",
            $"VaR {count.Confidence}: {actual}, hypothetical {Numerals.Count(count.Hypothetical)}; {zone}", mark);
    }

    private static string Every(int count) => count == 2 ? "both limits" : $"all {Phrases.Number(count)} limits";

    private static string Is(int count) => count == 1 ? "is" : "are";
}
