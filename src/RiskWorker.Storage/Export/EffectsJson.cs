using System.Text.Json;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Export;

/// <summary>The part of <c>results.json</c> on what the choices behind the figures do.</summary>
internal static class EffectsJson
{
    /// <summary>Writes the property <c>effects</c>.</summary>
    public static void Write(Utf8JsonWriter json, RunEffects effects)
    {
        json.WriteStartObject("effects");
        json.WriteNumber("scenarios", effects.Scenarios);
        json.Array("choices", effects.Choices, (item, choice) =>
        {
            item.WriteString("choice", choice.Choice);
            item.WriteString("instead", choice.Instead);
            item.Array("measures", choice.Measures, Paired);
        });
        json.Array("classes", effects.Classes, (item, one) =>
        {
            item.WriteString("class", Words.Of(one.Class));
            item.Array("measures", one.Measures, Paired);
        });
        json.Array("rootsOfTime", effects.RootsOfTime, (item, root) =>
        {
            ResultsJson.Spec(item, root.Spec);
            item.Number("simulated", root.Simulated);
            item.Number("scaled", root.Scaled);
        });
        json.Array("fills", effects.Fills, Fill);
        json.WriteEndObject();
    }

    private static void Paired(Utf8JsonWriter json, PairedMeasure pair)
    {
        ResultsJson.Spec(json, pair.Spec);
        json.Number("value", pair.Value);
        json.Number("otherwise", pair.Otherwise);
    }

    private static void Fill(Utf8JsonWriter json, FillEffect fill)
    {
        json.WriteString("factor", fill.Factor);
        json.WriteString("proxy", fill.Proxy);
        json.WriteNumber("days", fill.Days);
        json.Number("share", fill.Share);
        json.Number("volatility", fill.Volatility);
        json.Number("ownVolatility", fill.OwnVolatility);
        json.WriteString("other", fill.Other);
        json.Number("correlation", fill.Correlation);
        json.Number("ownCorrelation", fill.OwnCorrelation);
    }
}
