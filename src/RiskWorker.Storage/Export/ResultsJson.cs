using System.Text.Json;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Export;

/// <summary>
/// Writes <c>results.json</c> (schema 1): the figures of a run for machines. The same record gives the same bytes.
/// A number that is undefined is null; statuses are in lower case; a confidence is the decimal that was typed.
/// </summary>
public static class ResultsJson
{
    /// <summary>Raised when a field is changed or removed; added fields do not raise it.</summary>
    public const int Schema = 1;

    private static readonly JsonWriterOptions s_indented = new() { Indented = true, NewLine = "\n" };

    /// <summary>Writes <paramref name="record"/> to <paramref name="stream"/> as UTF-8 without a byte-order mark.</summary>
    public static void Write(RunRecord record, Stream stream)
    {
        ArgumentNullException.ThrowIfNull(record);
        ArgumentNullException.ThrowIfNull(stream);
        using var json = new Utf8JsonWriter(stream, s_indented);
        json.WriteStartObject();
        Identity(json, record);
        json.Array("nodes", record.Results.Nodes, Node);
        json.Array("models", record.Results.Models, ModelsJson.Model);
        json.Array("limits", record.Results.Limits, Limit);
        json.Array("findings", record.Results.Findings, Finding);
        json.Array("backtest", record.Results.Backtest, Backtest);
        json.Array("modelBacktests", record.Results.ModelBacktests, ModelsJson.Backtest);
        if (record.Results.Effects is { } effects) EffectsJson.Write(json, effects);
        Hypothetical(json, record.Results.Hypothetical);
        json.Lines("sensitivities", record.Results.Sensitivities, Sensitivity);
        Calibration(json, record.Results.Calibration);
        Holdings(json, record.Results.Holdings);
        json.Array("methods", record.Results.Methods, Method);
        json.Array("adjustments", record.Results.Adjustments, Adjustment);
        json.Array("parts", record.Parts, Part);
        Timings(json, record.Timings);
        json.WriteEndObject();
    }

    private static void Identity(Utf8JsonWriter json, RunRecord record)
    {
        var (results, simulation) = (record.Results, record.Results.Simulation);
        json.WriteNumber("schema", Schema);
        json.WriteString("run", record.Run);
        json.WriteString("asOf", Words.Date(record.AsOf));
        json.WriteString("status", Words.Of(record.Status));
        json.WriteString("model", record.Settings.Model.Name);
        json.Integer("scenarios", simulation?.Scenarios);
        json.WriteNumber("seed", simulation?.Seed ?? record.Settings.Simulation.Seed);
        json.WriteString("snapshot", "sha256:" + record.Snapshot);
        json.WriteString("version", record.Version);
        json.WriteString("figures", "sha256:" + record.Figures);
        json.WriteNumber("epoch", record.Epoch);
        json.WriteNumber("attempt", record.Attempt);
        json.WriteString("evidence", Words.Of(record.Evidence));
        json.WriteString("started", Words.Utc(record.Started));
        json.WriteString("finished", Words.Utc(record.Finished));
        json.WriteString("command", record.Command);
        json.WriteString("settings", "sha256:" + record.SettingsHash);
        json.WriteString("firm", results.Firm?.Name);
        json.WriteString("currency", results.Firm?.ReportingCurrency);
        json.Integer("looks", simulation?.Looks);
        json.Integer("looksPlanned", simulation?.LooksPlanned);
        json.Number("level", simulation?.Level);
        json.Boolean("precisionReached", simulation?.PrecisionReached);
        json.WriteString("previousRun", record.Previous?.Run);
        if (simulation?.Surfaces is { } surfaces) Surfaces(json, surfaces);
    }

    private static void Surfaces(Utf8JsonWriter json, SurfaceSummary surfaces)
    {
        json.WriteStartObject("surfaces");
        json.WriteNumber("count", surfaces.Count);
        json.WriteNumber("options", surfaces.Options);
        json.WriteNumber("scenarios", surfaces.Scenarios);
        json.WriteNumber("revalued", surfaces.Revalued);
        json.WriteEndObject();
    }

    private static void Node(Utf8JsonWriter json, NodeResult node)
    {
        json.WriteString("book", node.Book);
        json.WriteString("parent", node.Parent);
        json.WriteString("currency", node.Currency);
        json.Number("value", node.Value);
        json.Array("measures", node.Measures, Measure);
        if (node.MeasuresRoot is { } root) json.Array("measuresRoot", root, Measure);
        json.WriteString("name", node.Name);
        json.WriteNumber("depth", node.Depth);
        json.Number("valueRoot", node.ValueRoot);
        json.WriteNumber("positions", node.Positions);
        if (node.PriceError is { } error)
        {
            json.WriteStartObject("priceError");
            json.Number("table", error.Table);
            json.Number("standard", error.Standard);
            json.WriteEndObject();
        }
        json.Array("distributions", node.Distributions, Distribution);
    }

    internal static void Measure(Utf8JsonWriter json, MeasureResult measure)
    {
        Spec(json, measure.Spec);
        json.Number("value", measure.Value);
        json.Number("low", measure.Low);
        json.Number("high", measure.High);
        json.Number("level", measure.Level);
        if (measure.Sample is not { } sample) return;
        json.Number("sampleLow", sample.Low);
        json.Number("sampleHigh", sample.High);
    }

    internal static void Spec(Utf8JsonWriter json, MeasureSpec spec)
    {
        json.WriteString("measure", Words.Of(spec.Kind));
        json.WriteNumber("confidence", spec.Confidence.Level);
        json.WriteNumber("horizonDays", spec.Horizon.Days);
    }

    private static void Distribution(Utf8JsonWriter json, ProfitDistribution distribution)
    {
        json.WriteNumber("horizonDays", distribution.Horizon.Days);
        json.Number("mean", distribution.Mean);
        json.Number("deviation", distribution.Deviation);
        json.Number("low", distribution.Low);
        json.Number("high", distribution.High);
        json.Compact("counts", compact =>
        {
            compact.WriteStartArray();
            foreach (var count in distribution.Counts) compact.WriteNumberValue(count);
            compact.WriteEndArray();
        });
        json.Compact("quantiles", compact =>
        {
            compact.WriteStartArray();
            foreach (var (probability, profit, exact) in distribution.Quantiles)
            {
                compact.WriteStartObject();
                compact.Number("probability", probability);
                compact.Number("profit", profit);
                compact.WriteBoolean("exact", exact);
                compact.WriteEndObject();
            }
            compact.WriteEndArray();
        });
    }

    private static void Limit(Utf8JsonWriter json, LimitResult result)
    {
        var limit = result.Limit;
        json.WriteString("limit", limit.Name);
        json.WriteString("book", limit.Book);
        Spec(json, limit.Measure);
        json.Number("amount", limit.Amount);
        json.Number("value", result.Value);
        json.Number("used", result.Used);
        json.WriteString("status", Words.Of(result.Status));
        json.WriteString("currency", result.Currency);
        json.WriteString("basis", Words.Of(limit.Basis));
        json.WriteString("referenceBook", limit.ReferenceBook);
        json.Number("warnAt", limit.WarnAt);
        json.Number("low", result.Low);
        json.Number("high", result.High);
        json.Number("usedLow", result.UsedLow);
        json.Number("usedHigh", result.UsedHigh);
        json.Number("level", result.Level);
        json.WriteString("statusSince", Words.Date(result.StatusSince));
        json.WriteString("validFrom", Words.Date(limit.ValidFrom));
        json.WriteString("validTo", Words.Date(limit.ValidTo));
        json.WriteString("approver", limit.Approver);
        json.WriteString("reason", limit.Reason);
    }

    private static void Finding(Utf8JsonWriter json, Finding finding)
    {
        json.WriteString("severity", Words.Of(finding.Severity));
        json.WriteString("code", finding.Code);
        json.WriteString("subject", finding.Subject);
        json.WriteString("message", finding.Message);
    }

    private static void Backtest(Utf8JsonWriter json, BacktestResult backtest)
    {
        json.WriteString("book", backtest.Book);
        json.WriteNumber("confidence", backtest.Confidence.Level);
        json.WriteNumber("days", backtest.Days);
        json.WriteNumber("exceptions", backtest.Exceptions);
        json.WriteString("zone", backtest.Zone is { } zone ? Words.Of(zone) : null);
        json.WriteString("currency", backtest.Currency);
        json.Integer("actual", backtest.Actual);
        json.WriteNumber("hypothetical", backtest.Hypothetical);
        json.WriteNumber("missingVar", backtest.MissingVar);
        json.WriteNumber("backfilled", backtest.Backfilled);
        json.Compact("series", compact => Series(compact, backtest.Series));
    }

    private static void Series(Utf8JsonWriter json, IReadOnlyList<BacktestDay> series)
    {
        json.WriteStartArray();
        foreach (var day in series)
        {
            json.WriteStartObject();
            json.WriteString("date", Words.Date(day.Date));
            json.Number("var", day.Var);
            json.Number("actual", day.Actual);
            json.Number("hypothetical", day.Hypothetical);
            json.WriteString("evidence", day.Evidence is { } evidence ? Words.Of(evidence) : null);
            json.WriteEndObject();
        }
        json.WriteEndArray();
    }

    private static void Hypothetical(Utf8JsonWriter json, HypotheticalProfit? profit)
    {
        if (profit is null)
        {
            json.WriteNull("hypothetical");
            return;
        }
        json.WriteStartObject("hypothetical");
        json.WriteString("from", Words.Date(profit.From));
        json.WriteString("to", Words.Date(profit.To));
        json.Array("books", profit.Books, (book, amount) =>
        {
            book.WriteString("book", amount.Book);
            book.Number("amount", amount.Amount);
        });
        json.WriteEndObject();
    }

    private static void Sensitivity(Utf8JsonWriter json, Sensitivity sensitivity)
    {
        json.WriteString("book", sensitivity.Book);
        json.WriteString("factor", sensitivity.Factor);
        json.WriteString("class", Words.Of(sensitivity.Class));
        json.WriteString("curve", sensitivity.Curve);
        json.Number("tenorYears", sensitivity.TenorYears);
        json.WriteString("measure", Words.Of(sensitivity.Measure));
        json.Number("value", sensitivity.Value);
        json.Number("gamma", sensitivity.Gamma);
    }

    internal static void Calibration(Utf8JsonWriter json, CalibrationSummary? calibration)
    {
        if (calibration is null)
        {
            json.WriteNull("calibration");
            return;
        }
        json.WriteStartObject("calibration");
        json.WriteNumber("shocks", calibration.Shocks);
        json.WriteNumber("droppedDays", calibration.DroppedDays);
        json.WriteString("from", Words.Date(calibration.From));
        json.WriteString("to", Words.Date(calibration.To));
        json.WriteNumber("factors", calibration.Factors);
        json.WriteNumber("still", calibration.Still);
        json.WriteNumber("rank", calibration.Rank);
        json.Number("repairDistance", calibration.RepairDistance);
        if (calibration.Parameters.Count > 0) json.Array("parameters", calibration.Parameters, ModelsJson.Parameter);
        json.WriteString("plan", "sha256:" + calibration.Plan);
        json.WriteEndObject();
    }

    private static void Holdings(Utf8JsonWriter json, Holdings holdings)
    {
        json.WriteStartObject("holdings");
        json.WriteNumber("positions", holdings.Positions);
        json.WriteNumber("priced", holdings.Priced);
        json.Number("grossValue", holdings.GrossValue);
        json.Number("previousGrossValue", holdings.PreviousGrossValue);
        json.WriteNumber("reconciled", holdings.Reconciled);
        json.Number("breakTotal", holdings.BreakTotal);
        json.Array("breaks", holdings.Breaks, (line, found) =>
        {
            line.WriteString("book", found.Book);
            line.WriteString("instrument", found.Instrument);
            line.WriteString("currency", found.Currency);
            line.Number("modelValue", found.ModelValue);
            line.Number("marketValue", found.MarketValue);
        });
        json.Array("unpriced", holdings.Unpriced, (line, unpriced) =>
        {
            line.WriteString("book", unpriced.Book);
            line.WriteString("instrument", unpriced.Instrument);
            line.WriteString("kind", unpriced.Kind);
            line.Number("quantity", unpriced.Quantity);
            line.Number("size", unpriced.Size);
            line.WriteString("reason", unpriced.Reason);
        });
        json.WriteEndObject();
    }

    private static void Method(Utf8JsonWriter json, ValuationMethod method)
    {
        json.WriteString("kind", method.Kind);
        json.WriteString("model", method.Model);
        json.WriteString("method", method.Method);
        json.WriteString("source", method.Source);
        json.WriteString("caution", method.Caution);
        json.WriteNumber("lines", method.Lines);
    }

    private static void Adjustment(Utf8JsonWriter json, AppliedAdjustment adjustment)
    {
        json.WriteString("factor", adjustment.Factor);
        json.WriteString("date", Words.Date(adjustment.Date));
        json.Number("ratio", adjustment.Ratio);
        json.WriteString("reason", adjustment.Reason);
    }

    private static void Part(Utf8JsonWriter json, SnapshotPart part)
    {
        json.WriteString("file", part.Path);
        json.WriteString("hash", "sha256:" + part.Hash);
    }

    private static void Timings(Utf8JsonWriter json, Timings timings)
    {
        json.WriteStartObject("timings");
        json.Number("load", timings.Load);
        json.Number("calibrate", timings.Calibrate);
        json.Number("simulate", timings.Simulate);
        json.Number("report", timings.Report);
        json.WriteEndObject();
    }
}
