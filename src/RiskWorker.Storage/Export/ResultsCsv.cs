using System.Globalization;
using RiskWorker.Domain.Runs;
using static RiskWorker.Storage.Export.CsvCells;

namespace RiskWorker.Storage.Export;

/// <summary>
/// Writes <c>results.csv</c>: one tidy table for spreadsheets, a row for each node and measure, a row for each limit, and a row for each
/// node and measure of a model beside the one of record (<c>row</c> says which: node, limit, model). RFC 4180, UTF-8, '.' decimals; the same record gives the same bytes.
/// </summary>
public static class ResultsCsv
{
    private const string Header =
        "run,as_of,row,book,parent,currency,book_value,measure,confidence,horizon_days,value,low,high,level,limit,amount,basis,reference_book,used,used_low,used_high,status,status_since,model,sample_low,sample_high";

    /// <summary>Writes <paramref name="record"/> to <paramref name="stream"/>.</summary>
    public static void Write(RunRecord record, Stream stream)
    {
        ArgumentNullException.ThrowIfNull(record);
        ArgumentNullException.ThrowIfNull(stream);
        using var text = TextOn(stream);
        text.WriteLine(Header);
        var root = record.Results.Firm?.ReportingCurrency ?? "";
        foreach (var node in record.Results.Nodes)
        {
            foreach (var measure in node.Measures) text.WriteLine(Node(record, node, node.Currency, node.Value, measure));
            foreach (var measure in node.MeasuresRoot ?? []) text.WriteLine(Node(record, node, root, node.ValueRoot, measure));
        }
        foreach (var limit in record.Results.Limits) text.WriteLine(Limit(record, limit));
        var nodes = record.Results.Nodes.ToDictionary(n => n.Book, StringComparer.Ordinal);
        foreach (var model in record.Results.Models)
        {
            foreach (var node in model.Nodes)
            {
                foreach (var measure in node.Measures) text.WriteLine(Measure(record, "model", nodes[node.Book], node.Currency, nodes[node.Book].Value, measure, model.Name));
            }
        }
    }

    private static string Node(RunRecord record, NodeResult node, string currency, double value, MeasureResult measure) =>
        Measure(record, "node", node, currency, value, measure, record.Settings.Model.Name);

    private static string Measure(RunRecord record, string row, NodeResult node, string currency, double value, MeasureResult measure, string model) => string.Join(',',
        Text(record.Run), Words.Date(record.AsOf), row, Text(node.Book), Text(node.Parent), Text(currency), Number(value),
        Spec(measure.Spec), Number(measure.Value), Number(measure.Low), Number(measure.High), Number(measure.Level), ",,,,,,,,",
        Text(model), Number(measure.Sample?.Low), Number(measure.Sample?.High));

    private static string Limit(RunRecord record, LimitResult result) => string.Join(',',
        Text(record.Run), Words.Date(record.AsOf), "limit", Text(result.Limit.Book), "", Text(result.Currency), "",
        Spec(result.Limit.Measure), Number(result.Value), Number(result.Low), Number(result.High), Number(result.Level),
        Text(result.Limit.Name), Number(result.Limit.Amount), Words.Of(result.Limit.Basis), Text(result.Limit.ReferenceBook),
        Number(result.Used), Number(result.UsedLow), Number(result.UsedHigh), Words.Of(result.Status), Words.Date(result.StatusSince),
        Text(record.Settings.Model.Name), "", "");

    private static string Spec(MeasureSpec spec) =>
        string.Create(CultureInfo.InvariantCulture, $"{Words.Of(spec.Kind)},{spec.Confidence.Level},{spec.Horizon.Days}");
}
