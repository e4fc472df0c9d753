using System.Text.Json;

namespace RiskWorker.Benchmarks.Compare;

/// <summary>A figure of one book, with its standard error where the program gives one.</summary>
internal readonly record struct Figure(double Value, double StandardError);

/// <summary>One run of one program.</summary>
/// <param name="Simulate">Seconds of the simulation, as the program itself counts them.</param>
/// <param name="Whole">Seconds of the process.</param>
/// <param name="PeakMegabytes">Peak memory.</param>
/// <param name="Phases">Seconds by phase, in the program's own order.</param>
/// <param name="Figures">VaR 99% and ES 97.5% of every book.</param>
internal sealed record Measurement(
    double Simulate, double Whole, double PeakMegabytes, IReadOnlyList<(string Name, double Seconds)> Phases, IReadOnlyDictionary<(string Book, string Measure), Figure> Figures)
{
    // Half a 95% interval in standard errors.
    private const double HalfWidth = 1.959963984540054;

    public static Measurement OfPeer(ChildProcess process)
    {
        using var json = JsonDocument.Parse(process.Output);
        var figures = new Dictionary<(string, string), Figure>();
        foreach (var node in json.RootElement.GetProperty("nodes").EnumerateObject())
        {
            figures[(node.Name, "var")] = new(node.Value.GetProperty("var99").GetDouble(), double.NaN);
            figures[(node.Name, "es")] = new(node.Value.GetProperty("es975").GetDouble(), double.NaN);
        }
        return Of(process, json.RootElement.GetProperty("timings"), figures);
    }

    public static Measurement OfRiskworker(ChildProcess process, int scenarios)
    {
        using var json = JsonDocument.Parse(process.Output);
        if (json.RootElement.GetProperty("scenarios").GetInt32() != scenarios) throw new InvalidOperationException("The run took another number of scenarios than it was asked for.");
        var figures = new Dictionary<(string, string), Figure>();
        foreach (var node in json.RootElement.GetProperty("nodes").EnumerateArray())
        {
            foreach (var measure in node.GetProperty("measures").EnumerateArray())
            {
                if (measure.GetProperty("level").GetDouble() != 0.95) throw new InvalidOperationException("The intervals are not at 95%.");
                var width = measure.GetProperty("high").GetDouble() - measure.GetProperty("low").GetDouble();
                figures[(node.GetProperty("book").GetString()!, measure.GetProperty("measure").GetString()!)] = new(measure.GetProperty("value").GetDouble(), width / 2 / HalfWidth);
            }
        }
        return Of(process, json.RootElement.GetProperty("timings"), figures);
    }

    private static Measurement Of(ChildProcess process, JsonElement timings, Dictionary<(string, string), Figure> figures)
    {
        var phases = timings.EnumerateObject().Where(t => t.Name != "total").Select(t => (t.Name, t.Value.GetDouble())).ToList();
        phases.Add(("the rest", process.Seconds - phases.Sum(p => p.Item2)));
        return new(timings.GetProperty("simulate").GetDouble(), process.Seconds, process.PeakMegabytes, phases, figures);
    }
}
