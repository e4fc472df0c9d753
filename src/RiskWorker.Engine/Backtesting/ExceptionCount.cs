using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting;

/// <summary>
/// Counts the days of the last year whose loss was beyond the VaR of the previous close, on actual and on hypothetical profit; a VaR
/// or a profit that is missing counts as an exception (MAR32.4 to MAR32.9; Regulation (EU) 575/2013, article 366(3): the greater count).
/// </summary>
public sealed class ExceptionCount
{
    /// <summary>Most days that are counted.</summary>
    public const int Window = 250;

    private readonly BookTree _tree;
    private readonly DateOnly[] _days;
    private readonly ActualProfits _actual;
    private readonly Dictionary<DateOnly, CountedClose> _closes = [];
    private readonly Dictionary<DateOnly, Dictionary<string, double>> _hypothetical = [];

    /// <summary>Gathers profit and the VaR of counted runs.</summary>
    /// <param name="snapshot">Holds the runs that are counted, observations and actual profit.</param>
    /// <param name="tree">Its books.</param>
    /// <param name="today">Hypothetical profit that ends on the as-of date, or null.</param>
    public ExceptionCount(Snapshot snapshot, BookTree tree, HypotheticalProfit? today)
    {
        _tree = tree;
        _days = BacktestDays.Of(snapshot.Observations);
        _actual = new(snapshot, tree);
        foreach (var run in snapshot.CountedRuns) _closes[run.AsOf] = new(run);
        GatherHypothetical(snapshot, today);
    }

    /// <summary>
    /// One result for each node and each confidence of a one-day VaR among <paramref name="measures"/>, by node, then confidence. Days
    /// before the first run that reports the VaR of that node and confidence are not counted; a gap after it is an exception.
    /// </summary>
    /// <param name="snapshot">Holds the runs that are counted, observations and actual profit.</param>
    /// <param name="tree">Its books.</param>
    /// <param name="measures">Measures of this run.</param>
    /// <param name="today">Hypothetical profit that ends on the as-of date, or null.</param>
    public static IReadOnlyList<BacktestResult> Of(Snapshot snapshot, BookTree tree, IEnumerable<MeasureSpec> measures, HypotheticalProfit? today) =>
        new ExceptionCount(snapshot, tree, today).Results(measures);

    /// <summary>As <see cref="Of"/>.</summary>
    public IReadOnlyList<BacktestResult> Results(IEnumerable<MeasureSpec> measures)
    {
        var confidences = ConfidencesOf(measures);
        return [.. Enumerable.Range(0, _tree.Books.Count).SelectMany(node => confidences.Select(c => Count(node, c)))];
    }

    /// <summary>The confidences of a one-day VaR among <paramref name="measures"/>, ascending.</summary>
    public static Confidence[] ConfidencesOf(IEnumerable<MeasureSpec> measures) =>
        [.. measures.Where(m => m.Kind == MeasureKind.Var && m.Horizon.Days == 1).Select(m => m.Confidence).Distinct().Order()];

    /// <summary>Hypothetical profit of a book on a day, or null where it is not known.</summary>
    public double? HypotheticalOf(string book, DateOnly date) => _hypothetical.TryGetValue(date, out var books) && books.TryGetValue(book, out var amount) ? amount : null;

    /// <summary>Whether the node has actual profit.</summary>
    public bool HasActual(int node) => _actual.HasSeries(node);

    /// <summary>Profit by the day that it ends on: only such as starts from the counted day before is held against that day's VaR.</summary>
    private void GatherHypothetical(Snapshot snapshot, HypotheticalProfit? today)
    {
        foreach (var run in snapshot.CountedRuns)
        {
            if (run.HypotheticalDate is { } from) Keep(from, run.AsOf, run.Hypothetical);
        }
        var profits = new HypotheticalProfits(snapshot, _tree);
        foreach (var held in snapshot.EarlierPositions)
        {
            if (DayAfter(held.Date) is not { } to || _hypothetical.ContainsKey(to)) continue;
            Keep(held.Date, to, profits.From(held, to).Profit.Books);
        }
        if (today is not null) Keep(today.From, today.To, today.Books);
    }

    private void Keep(DateOnly from, DateOnly to, IReadOnlyList<BookAmount> books)
    {
        if (DayAfter(from) == to) _hypothetical[to] = books.ToDictionary(b => b.Book, b => b.Amount, StringComparer.Ordinal);
    }

    /// <summary>The counted day after <paramref name="day"/>, which must be one itself.</summary>
    private DateOnly? DayAfter(DateOnly day)
    {
        var index = Array.BinarySearch(_days, day);
        return index >= 0 && index + 1 < _days.Length ? _days[index + 1] : null;
    }

    private BacktestResult Count(int node, Confidence confidence)
    {
        var book = _tree.Books[node];
        var series = Series(node, confidence, Window);
        int? actual = _actual.HasSeries(node) ? series.Count(d => BacktestDay.IsException(d.Var, d.Actual)) : null;
        var hypothetical = series.Count(d => BacktestDay.IsException(d.Var, d.Hypothetical));
        return new()
        {
            Book = book.Name,
            Confidence = confidence,
            Currency = book.Currency,
            Series = series,
            Actual = actual,
            Hypothetical = hypothetical,
            MissingVar = series.Count(d => d.Var is null),
            Backfilled = series.Count(d => d.Evidence == EvidenceKind.Backfilled),
            Zone = BacktestZones.Of(Math.Max(actual ?? 0, hypothetical), series.Count, confidence),
        };
    }

    /// <summary>The newest days of a node, oldest first: none before the first run that reports the VaR.</summary>
    /// <param name="node">Node number.</param>
    /// <param name="confidence">Confidence of the VaR.</param>
    /// <param name="window">Most days.</param>
    /// <param name="challenger">A model that ran beside the one of record, or null for that one.</param>
    public IReadOnlyList<BacktestDay> Series(int node, Confidence confidence, int window, string? challenger = null)
    {
        var book = _tree.Books[node].Name;
        var series = new List<BacktestDay>();
        if (FirstCounted(book, confidence, challenger) is not { } first) return series;
        for (var t = Math.Max(1, _days.Length - window); t < _days.Length; t++)
        {
            if (_days[t] <= first) continue;
            var close = _closes.GetValueOrDefault(_days[t - 1]);
            var var = close?.VarOf(book, confidence, challenger);
            double? hypothetical = _hypothetical.TryGetValue(_days[t], out var books) && books.TryGetValue(book, out var amount) ? amount : null;
            series.Add(new(_days[t], var, _actual.Of(node, _days[t]), hypothetical, var is null ? null : close!.Evidence));
        }
        return series;
    }

    private DateOnly? FirstCounted(string book, Confidence confidence, string? challenger)
    {
        DateOnly? first = null;
        foreach (var (date, close) in _closes)
        {
            if (close.VarOf(book, confidence, challenger) is not null && !(date >= first)) first = date;
        }
        return first;
    }

    /// <summary>What a stored run said at its close.</summary>
    private sealed class CountedClose(CountedRun run)
    {
        // The empty name is the model of record's: a model of the settings has one.
        private readonly Dictionary<(string, string, Confidence), double> _var = run.Measures.Select(m => (Key: ("", m.Book, m.Confidence), m.Value))
            .Concat(run.Challengers.Select(c => (Key: (c.Model, c.Book, c.Confidence), c.Value))).ToDictionary(m => m.Key, m => m.Value);

        public EvidenceKind Evidence => run.Evidence;

        public double? VarOf(string book, Confidence confidence, string? challenger) => _var.TryGetValue((challenger ?? "", book, confidence), out var value) ? value : null;
    }
}
