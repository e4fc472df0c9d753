using System.Text.Json;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Export;

/// <summary>The part of <c>results.json</c> on models that run side by side.</summary>
internal static class ModelsJson
{
    /// <summary>A model beside the one of record.</summary>
    public static void Model(Utf8JsonWriter json, ModelResult model)
    {
        json.WriteString("name", model.Name);
        json.WriteString("kind", ModelKinds.NameOf(model.Kind));
        json.Integer("scenarios", model.Simulation?.Scenarios);
        json.Number("level", model.Simulation?.Level);
        ResultsJson.Calibration(json, model.Calibration);
        json.Array("nodes", model.Nodes, Node);
    }

    /// <summary>A number that a model was calibrated to or given.</summary>
    public static void Parameter(Utf8JsonWriter json, ModelParameter parameter)
    {
        json.WriteString("name", parameter.Name);
        json.Number("value", parameter.Value);
        json.Number("low", parameter.Low);
        json.Number("high", parameter.High);
        json.WriteString("note", parameter.Note);
    }

    /// <summary>How a model stood up.</summary>
    public static void Backtest(Utf8JsonWriter json, ModelBacktest backtest)
    {
        json.WriteString("model", backtest.Model);
        json.WriteString("book", backtest.Book);
        json.WriteNumber("confidence", backtest.Confidence.Level);
        json.WriteNumber("window", backtest.Window);
        json.WriteNumber("days", backtest.Days);
        json.WriteNumber("exceptions", backtest.Exceptions);
        json.WriteString("zone", backtest.Zone is { } zone ? Words.Of(zone) : null);
        Test(json, "coverage", backtest.Coverage);
        Test(json, "independence", backtest.Independence);
        Test(json, "conditional", backtest.Conditional);
    }

    private static void Node(Utf8JsonWriter json, ModelNode node)
    {
        json.WriteString("book", node.Book);
        json.WriteString("currency", node.Currency);
        json.Array("measures", node.Measures, ResultsJson.Measure);
    }

    private static void Test(Utf8JsonWriter json, string name, TestResult? test)
    {
        if (test is null)
        {
            json.WriteNull(name);
            return;
        }
        json.WriteStartObject(name);
        json.Number("statistic", test.Statistic);
        json.Number("pValue", test.PValue);
        json.WriteEndObject();
    }
}
