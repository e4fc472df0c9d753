using System.Text.Json;
using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Export;

/// <summary>
/// Writes <c>backtest.json</c> (schema 1): backtest evidence for machines. The same evidence gives the same bytes. A number that is
/// undefined or missing is null; words are in lower case; a confidence is the decimal that was typed.
/// </summary>
public static class BacktestJson
{
    /// <summary>Raised when a field is changed or removed; added fields do not raise it.</summary>
    public const int Schema = 1;

    private static readonly JsonWriterOptions s_indented = new() { Indented = true, NewLine = "\n" };

    /// <summary>Writes <paramref name="evidence"/> to <paramref name="stream"/> as UTF-8 without a byte-order mark.</summary>
    public static void Write(BacktestEvidence evidence, Stream stream)
    {
        ArgumentNullException.ThrowIfNull(evidence);
        ArgumentNullException.ThrowIfNull(stream);
        using var json = new Utf8JsonWriter(stream, s_indented);
        json.WriteStartObject();
        json.WriteNumber("schema", Schema);
        json.WriteString("kind", EvidenceWording.Of(evidence.Kind));
        json.WriteString("from", Words.Date(evidence.From));
        json.WriteString("to", Words.Date(evidence.To));
        json.WriteString("model", evidence.Model.Name);
        json.Array("series", evidence.Series, Series);
        Identity(json, evidence);
        json.Array("exceptions", evidence.Exceptions, Exception);
        json.Lines("models", evidence.Models, Model);
        json.Lines("runs", evidence.Runs, Run);
        json.WriteEndObject();
    }

    private static void Identity(Utf8JsonWriter json, BacktestEvidence evidence)
    {
        json.WriteString("positions", EvidenceWording.Optional(evidence.Positions));
        json.WriteString("firm", evidence.Firm.Name);
        json.WriteString("currency", evidence.Firm.ReportingCurrency);
        json.Integer("scenarios", evidence.Scenarios);
        json.WriteString("inputs", "sha256:" + evidence.Inputs);
        json.WriteString("command", evidence.Command);
        json.WriteString("made", Words.Utc(evidence.Made));
        json.WriteString("version", evidence.Version);
        json.WriteNumber("epoch", evidence.Epoch);
    }

    private static void Series(Utf8JsonWriter json, BacktestSeries series)
    {
        json.WriteString("book", series.Book);
        json.WriteNumber("confidence", series.Confidence.Level);
        json.WriteString("pnl", Words.Of(series.Profit));
        json.Compact("days", compact => Days(compact, series.Days));
        json.WriteNumber("count", series.Count);
        json.Number("expected", series.Expected);
        json.WriteString("zone", EvidenceWording.Optional(series.Zone));
        json.Number("multiplier", series.Multiplier);
        json.Array("tests", series.Tests, Test);
        json.WriteString("name", series.Name);
        json.WriteNumber("depth", series.Depth);
        json.WriteString("currency", series.Currency);
        json.Boolean("keepsDeskLimit", series.KeepsDeskLimit);
        json.Compact("probabilities", compact =>
        {
            compact.WriteStartArray();
            foreach (var count in series.Probabilities) compact.WriteNumberValue(count);
            compact.WriteEndArray();
        });
    }

    private static void Days(Utf8JsonWriter json, IReadOnlyList<EvidenceDay> days)
    {
        json.WriteStartArray();
        foreach (var day in days)
        {
            json.WriteStartObject();
            json.WriteString("date", Words.Date(day.Date));
            json.Number("var", day.Var);
            json.Number("es", day.Es);
            json.Number("pnl", day.Profit);
            json.Number("p", day.P);
            json.WriteBoolean("exception", day.Exception);
            json.WriteEndObject();
        }
        json.WriteEndArray();
    }

    private static void Test(Utf8JsonWriter json, StatisticalTest test)
    {
        json.WriteString("name", test.Name);
        json.Number("statistic", test.Statistic);
        json.Number("pValue", test.PValue);
        json.WriteString("method", EvidenceWording.Optional(test.Method));
        json.Boolean("reject", test.Reject);
        json.WriteString("source", test.Source);
        json.WriteString("note", test.Note.Length == 0 ? null : test.Note);
    }

    private static void Exception(Utf8JsonWriter json, ExceptionEntry entry)
    {
        json.WriteString("date", Words.Date(entry.Date));
        json.WriteString("book", entry.Book);
        json.WriteNumber("confidence", entry.Confidence.Level);
        json.WriteString("pnl", Words.Of(entry.Profit));
        json.WriteString("currency", entry.Currency);
        json.Number("amount", entry.Amount);
        json.Number("var", entry.Var);
        json.Number("excess", EvidenceWording.Excess(entry));
        json.WriteNumber("age", entry.Age);
        json.Array("books", entry.Books, (item, book) =>
        {
            item.WriteString("book", book.Book);
            item.Number("amount", book.Amount);
        });
        json.Array("factors", entry.Factors, (item, factor) =>
        {
            item.WriteString("factor", factor.Factor);
            item.Number("amount", factor.Amount);
        });
        if (entry.Explanation is { } explanation)
        {
            json.WriteStartObject("explanation");
            Explanation(json, explanation);
            json.WriteEndObject();
        }
        else
        {
            json.WriteNull("explanation");
        }
        json.Array("corrected", entry.Corrected, Explanation);
    }

    private static void Explanation(Utf8JsonWriter json, ExceptionExplanation explanation)
    {
        json.WriteString("cause", Words.Of(explanation.Cause));
        json.WriteString("text", explanation.Text);
        json.WriteString("author", explanation.Author);
        json.WriteString("written", Words.Utc(explanation.Written));
    }

    private static void Model(Utf8JsonWriter json, ModelCount count)
    {
        json.WriteString("model", count.Model);
        json.WriteString("book", count.Book);
        json.WriteNumber("confidence", count.Confidence.Level);
        json.WriteNumber("days", count.Days);
        json.WriteNumber("exceptions", count.Exceptions);
        json.WriteString("zone", EvidenceWording.Optional(count.Zone));
        json.Number("meanVar", count.MeanVar);
    }

    private static void Run(Utf8JsonWriter json, EvidenceRun run)
    {
        json.WriteString("asOf", Words.Date(run.AsOf));
        json.WriteString("run", run.Run);
        json.WriteString("hash", "sha256:" + run.Hash);
        json.WriteString("evidence", Words.Of(run.Evidence));
    }
}
