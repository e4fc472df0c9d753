using RiskWorker.Domain.Runs;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>One model of a run as the section on models reads it, the one of record like the others.</summary>
internal sealed class ModelReading
{
    private readonly Dictionary<string, IReadOnlyList<MeasureResult>> measures;

    private ModelReading(IEnumerable<(string Book, IReadOnlyList<MeasureResult> Measures)> nodes) =>
        measures = nodes.ToDictionary(node => node.Book, node => node.Measures, StringComparer.Ordinal);

    public required string Name { get; init; }

    public required ModelKind Kind { get; init; }

    /// <summary>Its settings; null where the record does not hold them.</summary>
    public ModelSettings? Settings { get; init; }

    public bool IsRecord { get; init; }

    public CalibrationSummary? Calibration { get; init; }

    public SimulationSummary? Simulation { get; init; }

    /// <summary>Whether it has figures: a model that could not be calibrated has none.</summary>
    public bool HasFigures => measures.Count > 0;

    /// <summary>The models of a run, the one of record first, then the others by name; a run without others has none to compare.</summary>
    public static IReadOnlyList<ModelReading> Of(RunReading run)
    {
        var settings = run.Record.Settings;
        if (run.Results.Models.Count == 0)
            return [];

        return
        [
            new(run.Results.Nodes.Select(node => (node.Book, node.Measures)))
            {
                Name = settings.Model.Name,
                Kind = settings.Model.Kind,
                Settings = settings.Model,
                IsRecord = true,
                Calibration = run.Results.Calibration,
                Simulation = run.Results.Simulation,
            },
            .. run.Results.Models.Select(model => new ModelReading(model.Nodes.Select(node => (node.Book, node.Measures)))
            {
                Name = model.Name,
                Kind = model.Kind,
                Settings = settings.Challengers.FirstOrDefault(one => one.Name == model.Name),
                Calibration = model.Calibration,
                Simulation = model.Simulation,
            }),
        ];
    }

    /// <summary>A measure of a book, in the currency of the book; null where there is none.</summary>
    public MeasureResult? Measure(string book, MeasureSpec spec) => RunReading.Find(measures.GetValueOrDefault(book), spec);
}
