using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;

namespace RiskWorker.Engine.Backtesting;

/// <summary>The exceptions of each model that runs side by side, over 250 and 500 days.</summary>
internal static class ModelBacktests
{
    private static readonly int[] s_windows = [250, 500];

    /// <summary>The model of record, then the others by name; for each its books depth first, confidences and windows ascending. Empty where there are no others.</summary>
    public static IReadOnlyList<ModelBacktest> Of(ExceptionCount count, RunSettings settings, BookTree tree, IEnumerable<MeasureSpec> measures)
    {
        if (settings.Challengers.Count == 0) return [];
        var confidences = ExceptionCount.ConfidencesOf(measures);
        return
        [
            .. from model in settings.Challengers.Select(c => c.Name).Prepend(null)
               from node in Enumerable.Range(0, tree.Books.Count)
               from confidence in confidences
               from window in s_windows
               select Of(count, model, settings.Model.Name, tree.Books[node].Name, node, confidence, window),
        ];
    }

    private static ModelBacktest Of(ExceptionCount count, string? challenger, string record, string book, int node, Confidence confidence, int window)
    {
        var series = count.Series(node, confidence, window, challenger);
        bool[] actual = count.HasActual(node) ? [.. series.Select(d => BacktestDay.IsException(d.Var, d.Actual))] : [];
        bool[] hypothetical = [.. series.Select(d => BacktestDay.IsException(d.Var, d.Hypothetical))];
        var worse = actual.Count(e => e) > hypothetical.Count(e => e) ? actual : hypothetical;
        var exceptions = worse.Count(e => e);
        return new()
        {
            Model = challenger ?? record,
            Book = book,
            Confidence = confidence,
            Window = window,
            Days = series.Count,
            Exceptions = exceptions,
            Zone = BacktestZones.Of(exceptions, series.Count, confidence),
            Coverage = CoverageTests.Coverage(worse, confidence),
            Independence = CoverageTests.Independence(worse),
            Conditional = CoverageTests.Conditional(worse, confidence),
        };
    }
}
