using RiskWorker.Domain.Runs;

namespace RiskWorker.Reporting.Tests.Reports;

/// <summary>Puts invented models beside the one of record of a <see cref="SampleRun"/>.</summary>
internal static class SampleModels
{
    /// <summary>A run with a log-normal model for each factor, which says that many times what the model of record says; intervals of 1% to each side.</summary>
    public static RunRecord Beside(RunRecord run, params IReadOnlyList<(string Name, double Times)> models) => With(
        run, [.. models.Select(model => Model(run, model.Name, ModelKind.Lognormal, measure => Scaled(measure, model.Times)))]);

    /// <summary>A run with the models given, settings for them, and counts of exceptions for each over 250 and 500 days.</summary>
    public static RunRecord With(RunRecord run, params IReadOnlyList<ModelResult> models) => run with
    {
        Settings = run.Settings with { Challengers = [.. models.Select(model => new ModelSettings { Name = model.Name, Kind = model.Kind, Covariance = CovarianceEstimator.Equal })] },
        Results = run.Results with { Models = models, ModelBacktests = Counts(run, [run.Settings.Model.Name, .. models.Select(model => model.Name)], 500) },
    };

    /// <summary>A model whose measures are made from those of the model of record.</summary>
    public static ModelResult Model(RunRecord run, string name, ModelKind kind, Func<MeasureResult, MeasureResult> measure) => new()
    {
        Name = name,
        Kind = kind,
        Calibration = run.Results.Calibration! with { Shocks = 480, DroppedDays = 0, Parameters = [] },
        Simulation = new(100_000, 1, 1, 1, 0.95, null),
        Nodes = [.. run.Results.Nodes.Select(node => new ModelNode(node.Book, node.Currency, [.. node.Measures.Select(measure)]))],
    };

    /// <summary>The measure of a history: no noise, and a sample beside it.</summary>
    public static MeasureResult Historical(MeasureResult measure, double times, double? low, double? high) =>
        new(measure.Spec, measure.Value * times, measure.Value * times, measure.Value * times, 0.95) { Sample = new(measure.Value * low, measure.Value * high) };

    /// <summary>A run whose model of record is a history.</summary>
    public static RunRecord History(RunRecord run, double? ageWeight = null) => run with
    {
        Settings = run.Settings with { Model = new() { Name = "past", Kind = ModelKind.Historical, AgeWeight = ageWeight } },
        Results = run.Results with
        {
            Simulation = new(500, 1, 1, 1, 0.95, null),
            Nodes = [.. run.Results.Nodes.Select(node => node with { Measures = Past(node.Measures), MeasuresRoot = node.MeasuresRoot is { } root ? Past(root) : null })],
            Limits = [.. run.Results.Limits.Select(limit => limit with { Low = limit.Value, High = limit.Value, UsedLow = limit.Used, UsedHigh = limit.Used })],
        },
    };

    /// <summary>The counts of models over 250 and 500 days, <paramref name="days"/> at most.</summary>
    public static IReadOnlyList<ModelBacktest> Counts(RunRecord run, IEnumerable<string> models, int days) =>
    [
        .. from model in models
           from node in run.Results.Nodes
           from window in (int[])[250, 500]
           select new ModelBacktest
           {
               Model = model,
               Book = node.Book,
               Confidence = new(0.99m),
               Window = window,
               Days = Math.Min(window, days),
               Exceptions = window / 100,
               Zone = days < 125 ? null : BacktestZone.Green,
               Coverage = new(0.1, 0.75),
               Independence = new(0.2, 0.65),
               Conditional = new(0.3, 0.86),
           },
    ];

    // One day has a sample, more days share days and claim none; days of different weight never do.
    private static MeasureResult[] Past(IReadOnlyList<MeasureResult> measures) =>
        [.. measures.Select(measure => measure.Spec.Horizon.Days == 1 ? Historical(measure, 1, 0.8, 1.5) : Historical(measure, 1, null, null))];

    private static MeasureResult Scaled(MeasureResult measure, double times) =>
        new(measure.Spec, measure.Value * times, measure.Value * times * 0.99, measure.Value * times * 1.01, 0.95);
}
