using System.Globalization;
using RiskWorker.Domain.Runs;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>The models of a run on the terminal: what each says of the top node, and how many times the figure of the model of record that is.</summary>
internal static class ModelListing
{
    /// <summary>Prints the models; nothing where there is only the one of record.</summary>
    public static void Write(RunRecord record, IAnsiConsole console)
    {
        var results = record.Results;
        if (results.Models.Count == 0) return;
        var top = results.Nodes[0];
        var table = new PlainTable().Words($"Models on {top.Book}").Labels("Measure").Numbers("Loss").Numbers("Ratio").Numbers("Interval");
        foreach (var (model, measures) in results.Models.Select(m => (m.Name, m.Nodes.FirstOrDefault(n => n.Book == top.Book)?.Measures ?? [])).Prepend((record.Settings.Model.Name, top.Measures)))
        {
            var name = model;
            foreach (var measure in measures)
            {
                table.Row(name, Figures.Measure(measure.Spec), Figures.Money(measure.Value), Ratio(top.Measures.FirstOrDefault(m => m.Spec == measure.Spec), measure), Figures.Interval(measure));
                name = "";
            }
            if (measures.Count == 0) table.Row(name, "no figures", "-", "-", "-");
        }
        table.Write(console);
        if (results.Models.SelectMany(m => m.Nodes).Any(n => n.Measures.Any(m => m.Sample is not null)))
        {
            console.WriteLine("The interval of a history is that of its days as a sample.");
            console.WriteLine();
        }
    }

    private static string Ratio(MeasureResult? record, MeasureResult measure) =>
        record is { Value: > 0 } ? (measure.Value / record.Value).ToString("N2", CultureInfo.InvariantCulture) : "-";
}
