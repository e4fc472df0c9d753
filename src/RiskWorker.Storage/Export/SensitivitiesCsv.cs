using RiskWorker.Domain.Runs;
using static RiskWorker.Storage.Export.CsvCells;

namespace RiskWorker.Storage.Export;

/// <summary>
/// Writes <c>sensitivities.csv</c>: a row for each node and factor that moves its value, in the currency of the node. RFC 4180, UTF-8,
/// '.' decimals; the same record gives the same bytes.
/// </summary>
public static class SensitivitiesCsv
{
    private const string Header = "run,as_of,book,currency,factor,class,curve,tenor_years,measure,value,gamma";

    /// <summary>Writes <paramref name="record"/> to <paramref name="stream"/>.</summary>
    public static void Write(RunRecord record, Stream stream)
    {
        ArgumentNullException.ThrowIfNull(record);
        ArgumentNullException.ThrowIfNull(stream);
        using var text = TextOn(stream);
        text.WriteLine(Header);
        var currencies = record.Results.Nodes.ToDictionary(n => n.Book, n => n.Currency, StringComparer.Ordinal);
        foreach (var sensitivity in record.Results.Sensitivities) text.WriteLine(Row(record, sensitivity, currencies[sensitivity.Book]));
    }

    private static string Row(RunRecord record, Sensitivity found, string currency) => string.Join(',',
        Text(record.Run), Words.Date(record.AsOf), Text(found.Book), Text(currency), Text(found.Factor), Words.Of(found.Class), Text(found.Curve),
        Number(found.TenorYears), Words.Of(found.Measure), Number(found.Value), Number(found.Gamma));
}
