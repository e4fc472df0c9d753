using System.Globalization;
using RiskWorker.Domain.Evidence;
using static RiskWorker.Storage.Export.CsvCells;

namespace RiskWorker.Storage.Export;

/// <summary>
/// Writes <c>exceptions.csv</c>: the register of exceptions, a row for the explanation that holds (state <c>holds</c>; <c>open</c> where there
/// is none) and one for each that it corrects (<c>corrected</c>). RFC 4180, UTF-8, '.' decimals; the same evidence gives the same bytes.
/// </summary>
public static class ExceptionsCsv
{
    private const int Costliest = 3;

    private const string Header =
        "date,book,confidence,pnl_kind,currency,pnl,var,excess,age_days,state,cause,explanation,author,written,book_1,book_1_pnl,book_2,book_2_pnl,book_3,book_3_pnl,factor_1,factor_1_pnl,factor_2,factor_2_pnl,factor_3,factor_3_pnl";

    /// <summary>Writes <paramref name="evidence"/> to <paramref name="stream"/>.</summary>
    public static void Write(BacktestEvidence evidence, Stream stream)
    {
        ArgumentNullException.ThrowIfNull(evidence);
        ArgumentNullException.ThrowIfNull(stream);
        using var text = TextOn(stream);
        text.WriteLine(Header);
        foreach (var entry in evidence.Exceptions)
        {
            foreach (var (state, explanation) in EvidenceWording.Explanations(entry)) text.WriteLine(Row(entry, state, explanation));
        }
    }

    private static string Row(ExceptionEntry entry, string state, ExceptionExplanation? explanation) => string.Join(',',
        Words.Date(entry.Date), Text(entry.Book), entry.Confidence.Level.ToString(CultureInfo.InvariantCulture), Words.Of(entry.Profit), Text(entry.Currency),
        Number(entry.Amount), Number(entry.Var), Number(EvidenceWording.Excess(entry)), entry.Age.ToString(CultureInfo.InvariantCulture), state,
        explanation is null ? "" : Words.Of(explanation.Cause), Text(explanation?.Text), Text(explanation?.Author), explanation is null ? "" : Words.Utc(explanation.Written),
        Costs([.. entry.Books.Select(book => (book.Book, book.Amount))]), Costs([.. entry.Factors.Select(factor => (factor.Factor, factor.Amount))]));

    private static string Costs((string Name, double Amount)[] parts) =>
        string.Join(',', Enumerable.Range(0, Costliest).Select(i => i < parts.Length ? $"{Text(parts[i].Name)},{Number(parts[i].Amount)}" : ","));
}
