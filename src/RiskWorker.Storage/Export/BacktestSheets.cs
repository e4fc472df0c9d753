using MiniExcelLibs.Attributes;
using RiskWorker.Domain.Evidence;

namespace RiskWorker.Storage.Export;

/// <summary>The rows of the sheets of <c>backtest.xlsx</c>. Numbers and dates stay what they are; text is neutralised.</summary>
internal static class BacktestSheets
{
    private const string DateFormat = "yyyy-MM-dd";

    public static IEnumerable<SummaryRow> Summary(BacktestEvidence evidence) => evidence.Series.Select(one => new SummaryRow(
        Text(one.Book), Text(one.Name), one.Confidence.Level, Words.Of(one.Profit), one.Days.Count, one.Count, Finite(one.Expected), EvidenceWording.Optional(one.Zone),
        Finite(one.Multiplier), one.KeepsDeskLimit, Text(one.Currency)));

    public static IEnumerable<DayRow> Days(BacktestEvidence evidence) =>
        from one in evidence.Series
        let book = Text(one.Book)
        let currency = Text(one.Currency)
        from day in one.Days
        select new DayRow(book, one.Confidence.Level, Words.Of(one.Profit), day.Date, Finite(day.Var), Finite(day.Es), Finite(day.Profit), Finite(day.P), day.Exception, currency);

    public static IEnumerable<TestRow> Tests(BacktestEvidence evidence) =>
        from one in evidence.Series
        from test in one.Tests
        select new TestRow(
            Text(one.Book), one.Confidence.Level, Words.Of(one.Profit), Text(test.Name), Finite(test.Statistic), Finite(test.PValue), EvidenceWording.Optional(test.Method), test.Reject,
            Text(test.Source), Text(test.Note));

    public static IEnumerable<ExceptionRow> Exceptions(BacktestEvidence evidence) =>
        from entry in evidence.Exceptions
        from told in EvidenceWording.Explanations(entry)
        select new ExceptionRow(
            entry.Date, Text(entry.Book), entry.Confidence.Level, Words.Of(entry.Profit), Text(entry.Currency), Finite(entry.Amount), Finite(entry.Var), Finite(EvidenceWording.Excess(entry)), entry.Age,
            told.State, EvidenceWording.Optional(told.Explanation?.Cause), Text(told.Explanation?.Text), Text(told.Explanation?.Author), told.Explanation is { } written ? Words.Utc(written.Written) : null,
            Text(string.Join("; ", entry.Books.Select(book => $"{book.Book} {CsvCells.Number(book.Amount)}"))), Text(string.Join("; ", entry.Factors.Select(factor => $"{factor.Factor} {CsvCells.Number(factor.Amount)}"))));

    public static IEnumerable<ModelRow> Models(BacktestEvidence evidence) => evidence.Models.Select(model => new ModelRow(
        Text(model.Model), Text(model.Book), model.Confidence.Level, model.Days, model.Exceptions, EvidenceWording.Optional(model.Zone), Finite(model.MeanVar)));

    public static IEnumerable<RunRow> Runs(BacktestEvidence evidence) => evidence.Runs.Select(run => new RunRow(run.AsOf, Text(run.Run), Words.Of(run.Evidence), Text(run.Hash)));

    private static double? Finite(double? value) => value is { } number && double.IsFinite(number) ? number : null;

    private static string? Text(string? text) => text is null ? null : CsvCells.Neutral(text);

    internal sealed record SummaryRow(
        [property: ExcelColumn(Name = "book", Width = 16)] string? Book, [property: ExcelColumn(Name = "name", Width = 24)] string? Name, [property: ExcelColumn(Name = "confidence")] decimal Confidence,
        [property: ExcelColumn(Name = "pnl_kind", Width = 14)] string Profit, [property: ExcelColumn(Name = "days")] int Days, [property: ExcelColumn(Name = "exceptions", Width = 11)] int Count,
        [property: ExcelColumn(Name = "expected")] double? Expected, [property: ExcelColumn(Name = "zone")] string? Zone, [property: ExcelColumn(Name = "multiplier")] double? Multiplier,
        [property: ExcelColumn(Name = "keeps_desk_limit", Width = 16)] bool? KeepsDeskLimit, [property: ExcelColumn(Name = "currency")] string? Currency);

    internal sealed record DayRow(
        [property: ExcelColumn(Name = "book", Width = 16)] string? Book, [property: ExcelColumn(Name = "confidence")] decimal Confidence, [property: ExcelColumn(Name = "pnl_kind", Width = 14)] string Profit,
        [property: ExcelColumn(Name = "date", Format = DateFormat, Width = 12)] DateOnly Date, [property: ExcelColumn(Name = "var", Width = 16)] double? Var, [property: ExcelColumn(Name = "es", Width = 16)] double? Es,
        [property: ExcelColumn(Name = "pnl", Width = 16)] double? Amount, [property: ExcelColumn(Name = "p", Width = 12)] double? P, [property: ExcelColumn(Name = "exception")] bool Exception,
        [property: ExcelColumn(Name = "currency")] string? Currency);

    internal sealed record TestRow(
        [property: ExcelColumn(Name = "book", Width = 16)] string? Book, [property: ExcelColumn(Name = "confidence")] decimal Confidence, [property: ExcelColumn(Name = "pnl_kind", Width = 14)] string Profit,
        [property: ExcelColumn(Name = "test", Width = 30)] string? Test, [property: ExcelColumn(Name = "statistic", Width = 16)] double? Statistic, [property: ExcelColumn(Name = "p_value", Width = 16)] double? PValue,
        [property: ExcelColumn(Name = "method", Width = 12)] string? Method, [property: ExcelColumn(Name = "reject")] bool? Reject, [property: ExcelColumn(Name = "source", Width = 50)] string? Source,
        [property: ExcelColumn(Name = "note", Width = 50)] string? Note);

    internal sealed record ExceptionRow(
        [property: ExcelColumn(Name = "date", Format = DateFormat, Width = 12)] DateOnly Date, [property: ExcelColumn(Name = "book", Width = 16)] string? Book, [property: ExcelColumn(Name = "confidence")] decimal Confidence,
        [property: ExcelColumn(Name = "pnl_kind", Width = 14)] string Profit, [property: ExcelColumn(Name = "currency")] string? Currency, [property: ExcelColumn(Name = "pnl", Width = 16)] double? Amount,
        [property: ExcelColumn(Name = "var", Width = 16)] double? Var, [property: ExcelColumn(Name = "excess", Width = 16)] double? Excess, [property: ExcelColumn(Name = "age_days")] int Age,
        [property: ExcelColumn(Name = "state", Width = 10)] string State, [property: ExcelColumn(Name = "cause", Width = 10)] string? Cause, [property: ExcelColumn(Name = "explanation", Width = 60)] string? Explanation,
        [property: ExcelColumn(Name = "author", Width = 16)] string? Author, [property: ExcelColumn(Name = "written", Width = 24)] string? Written, [property: ExcelColumn(Name = "books", Width = 40)] string? Books,
        [property: ExcelColumn(Name = "factors", Width = 40)] string? Factors);

    internal sealed record ModelRow(
        [property: ExcelColumn(Name = "model", Width = 16)] string? Model, [property: ExcelColumn(Name = "book", Width = 16)] string? Book, [property: ExcelColumn(Name = "confidence")] decimal Confidence,
        [property: ExcelColumn(Name = "days")] int Days, [property: ExcelColumn(Name = "exceptions", Width = 11)] int Exceptions, [property: ExcelColumn(Name = "zone")] string? Zone,
        [property: ExcelColumn(Name = "mean_var", Width = 16)] double? MeanVar);

    internal sealed record RunRow(
        [property: ExcelColumn(Name = "as_of", Format = DateFormat, Width = 12)] DateOnly AsOf, [property: ExcelColumn(Name = "run", Width = 18)] string? Run, [property: ExcelColumn(Name = "evidence", Width = 12)] string Evidence,
        [property: ExcelColumn(Name = "hash", Width = 68)] string? Hash);
}
