using System.Globalization;
using RiskWorker.Domain.Evidence;
using static RiskWorker.Storage.Export.CsvCells;

namespace RiskWorker.Storage.Export;

/// <summary>Writes <c>backtest-days.csv</c>: a row for every book, confidence, kind of profit and day. RFC 4180, UTF-8, '.' decimals; the same evidence gives the same bytes.</summary>
public static class BacktestDaysCsv
{
    private const string Header = "book,confidence,pnl_kind,date,var,es,pnl,p,exception,currency";

    /// <summary>Writes <paramref name="evidence"/> to <paramref name="stream"/>.</summary>
    public static void Write(BacktestEvidence evidence, Stream stream)
    {
        ArgumentNullException.ThrowIfNull(evidence);
        ArgumentNullException.ThrowIfNull(stream);
        using var text = TextOn(stream);
        text.WriteLine(Header);
        foreach (var series in evidence.Series)
        {
            var name = string.Create(CultureInfo.InvariantCulture, $"{Text(series.Book)},{series.Confidence.Level},{Words.Of(series.Profit)}");
            var currency = Text(series.Currency);
            foreach (var day in series.Days)
                text.WriteLine(string.Join(',', name, Words.Date(day.Date), Number(day.Var), Number(day.Es), Number(day.Profit), Number(day.P), day.Exception ? "true" : "false", currency));
        }
    }
}
