using RiskWorker.Domain.Books;
using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;

namespace RiskWorker.Engine.Backtesting;

/// <summary>
/// Puts forecasts and profits of a span of days together: series, tests and the register of exceptions. Recorded and backfilled days are
/// those of <see cref="ExceptionCount"/>, so that the daily report and the evidence agree.
/// </summary>
public sealed class EvidenceSpan
{
    private const int BooksNamed = 3;
    private const int Bins = 10;

    private readonly Snapshot _span;
    private readonly BookTree _tree;
    private readonly ExceptionCount _count;
    private readonly ActualProfits _actual;
    private readonly Dictionary<DateOnly, Dictionary<string, BookForecast>> _forecasts;
    private readonly List<DayForecast> _walk;
    private readonly Dictionary<(DateOnly, string), double> _independent;
    private readonly NullLaws _laws = new();
    private readonly DateOnly _from;
    private readonly bool _hasActual;

    /// <summary>Takes the span.</summary>
    /// <param name="span">Observations, profit and, for recorded and backfilled evidence, the runs to count.</param>
    /// <param name="tree">Its books.</param>
    /// <param name="from">First day of profit.</param>
    /// <param name="forecasts">Forecasts, oldest first.</param>
    /// <param name="walk">Positions of a walk-forward, which has no runs; null for runs. What was booked on past days has nothing to do with today's positions.</param>
    public EvidenceSpan(Snapshot span, BookTree tree, DateOnly from, IReadOnlyList<DayForecast> forecasts, BacktestPositions? walk)
    {
        ArgumentNullException.ThrowIfNull(forecasts);
        _hasActual = walk != BacktestPositions.Today;
        (_span, _tree, _from, _walk) = (span, tree, from, walk is not null ? [.. forecasts] : []);
        (_count, _actual) = (new(span, tree, null), new(span, tree));
        _forecasts = forecasts.ToDictionary(f => f.ProfitDate, f => f.Books.ToDictionary(b => b.Book, StringComparer.Ordinal));
        _independent = span.ProfitAndLoss.Where(p => p.Hypothetical is not null).GroupBy(p => (p.Date, p.Book)).ToDictionary(g => g.Key, g => g.First().Hypothetical!.Value);
    }

    /// <summary>The series of every book, confidence and kind of profit; books without actual profit have no series of it.</summary>
    /// <param name="confidences">Confidences, ascending.</param>
    public IReadOnlyList<BacktestSeries> Series(IReadOnlyList<Confidence> confidences)
    {
        var wanted = Enumerable.Range(0, _tree.Books.Count).SelectMany(node => confidences.SelectMany(c => Kinds(node).Select(kind => (Node: node, Confidence: c, Kind: kind)))).ToArray();
        var series = new BacktestSeries[wanted.Length];
        Parallel.For(0, wanted.Length, i => series[i] = Of(wanted[i].Node, wanted[i].Confidence, wanted[i].Kind));
        return series;
    }

    /// <summary>The exceptions of <paramref name="series"/>: unexplained ones first, then by date, book, confidence and kind.</summary>
    /// <param name="series">The series.</param>
    /// <param name="explanations">What was written, of each date and book the newest first.</param>
    /// <param name="factorsOf">The factors that cost a book most on a day; empty where not known.</param>
    public IReadOnlyList<ExceptionEntry> Register(
        IReadOnlyList<BacktestSeries> series, ILookup<(DateOnly Date, string Book), ExceptionExplanation> explanations, Func<DateOnly, string, IReadOnlyList<FactorAmount>> factorsOf)
    {
        var days = BacktestDays.Of(_span.Observations);
        return
        [
            .. series.SelectMany(s => s.Days.Where(d => d.Exception).Select(day => Entry(s, day)))
                .OrderBy(e => e.Explanation is not null).ThenBy(e => e.Date).ThenBy(e => _tree.IndexOf(e.Book)).ThenBy(e => e.Confidence).ThenBy(e => e.Profit),
        ];

        ExceptionEntry Entry(BacktestSeries one, EvidenceDay day)
        {
            var written = explanations[(day.Date, one.Book)].ToList();
            return new()
            {
                Date = day.Date,
                Book = one.Book,
                Confidence = one.Confidence,
                Profit = one.Profit,
                Currency = one.Currency,
                Amount = day.Profit,
                Var = day.Var,
                Books = Losers(one.Book, day.Date),
                Factors = factorsOf(day.Date, one.Book),
                Age = days.Count(d => d > day.Date),
                Explanation = written.FirstOrDefault(),
                Corrected = [.. written.Skip(1)],
            };
        }
    }

    /// <summary>The counts of models that ran beside the one of record, by hypothetical profit.</summary>
    public IReadOnlyList<ModelCount> Challengers(IReadOnlyList<Confidence> confidences) =>
        [.. from model in _span.CountedRuns.SelectMany(r => r.Challengers).Select(c => c.Model).Distinct().Order(StringComparer.Ordinal)
            from node in Enumerable.Range(0, _tree.Books.Count)
            from confidence in confidences
            let days = InSpan(_count.Series(node, confidence, int.MaxValue, model))
            where days.Count > 0
            let exceptions = days.Count(d => BacktestDay.IsException(d.Var, d.Hypothetical))
            select new ModelCount(model, _tree.Books[node].Name, confidence, days.Count, exceptions, BacktestZones.Of(exceptions, days.Count, confidence),
                days.Where(d => d.Var is not null).Select(d => d.Var!.Value).DefaultIfEmpty(double.NaN).Average())];

    private IEnumerable<ProfitKind> Kinds(int node) => _hasActual && _actual.HasSeries(node) ? [ProfitKind.Actual, ProfitKind.Hypothetical] : [ProfitKind.Hypothetical];

    private List<BacktestDay> InSpan(IEnumerable<BacktestDay> days) => [.. days.Where(d => d.Date >= _from)];

    private List<BacktestDay> DaysOf(int node, Confidence confidence)
    {
        if (_walk.Count == 0) return InSpan(_count.Series(node, confidence, int.MaxValue));
        return [.. _walk.Select(day =>
        {
            var book = day.Books[node];
            return new BacktestDay(day.ProfitDate, Level(book, confidence)?.Var, _actual.Of(node, day.ProfitDate), book.Theoretical, EvidenceKind.Backfilled);
        })];
    }

    private BacktestSeries Of(int node, Confidence confidence, ProfitKind kind)
    {
        var book = _tree.Books[node];
        EvidenceDay[] days = [.. DaysOf(node, confidence).Select(d => Day(book.Name, d, confidence, kind))];
        var count = days.Count(d => d.Exception);
        return new()
        {
            Book = book.Name,
            Name = book.DisplayName,
            Depth = _tree.DepthOf(node),
            Currency = book.Currency,
            Confidence = confidence,
            Profit = kind,
            Days = days,
            Count = count,
            Expected = days.Length * (double)(1 - confidence.Level),
            Zone = BacktestZones.Of(count, days.Length, confidence),
            Multiplier = days.Length == SupervisoryMultipliers.Days && confidence.Level == 0.99m ? (double)SupervisoryMultipliers.Multiplier(count) : null,
            KeepsDeskLimit = days.Length == SupervisoryMultipliers.Days && SupervisoryMultipliers.DeskLimit(confidence) is { } most ? count <= most : null,
            Tests = Tests(book.Name, days, confidence, kind),
            Probabilities = Histogram(days),
        };
    }

    private EvidenceDay Day(string book, BacktestDay day, Confidence confidence, ProfitKind kind)
    {
        var profit = kind == ProfitKind.Actual ? day.Actual : day.Hypothetical;
        var forecast = ForecastOf(day.Date, book);
        var shortfall = forecast is null ? null : Level(forecast, confidence)?.Es;
        return new(day.Date, day.Var, shortfall is { } es && double.IsFinite(es) ? es : null, profit, Probability(forecast, profit, kind), BacktestDay.IsException(day.Var, profit));
    }

    private double? Probability(BookForecast? forecast, double? profit, ProfitKind kind)
    {
        if (forecast is null || profit is not { } amount) return null;
        if (_walk.Count > 0) return kind == ProfitKind.Actual ? forecast.PActual : forecast.PTheoretical;
        return RecordedForecasts.ProbabilityOf(forecast.Tail, amount);
    }

    private IReadOnlyList<StatisticalTest> Tests(string book, EvidenceDay[] days, Confidence confidence, ProfitKind kind)
    {
        double[] transforms = [.. days.Select(d => d.P).OfType<double>()];
        var (independent, theoretical) = kind == ProfitKind.Hypothetical ? Attribution(book, days) : (null, null);
        return BacktestTests.Of(new()
        {
            Confidence = confidence,
            Exceptions = [.. days.Select(d => d.Exception)],
            Shortfall = Shortfall(book, days),
            Transforms = transforms.Length == 0 ? null : transforms,
            Hypothetical = independent,
            RiskTheoretical = theoretical,
        }, _laws);
    }

    // Days on which anything is missing say nothing of the size of losses.
    private List<ShortfallDay>? Shortfall(string book, EvidenceDay[] days)
    {
        var shortfall = new List<ShortfallDay>(days.Length);
        foreach (var day in days)
        {
            if (day is not { Var: { } var, Es: { } es, Profit: { } profit } || ForecastOf(day.Date, book) is not { Tail.Count: > 1 } forecast) continue;
            shortfall.Add(new(profit, var, es, new QuantileTable(Ascending(forecast.Tail)).At));
        }
        return shortfall.Count == 0 ? null : shortfall;
    }

    // Of quantiles that coincide to the last digit the order may be lost.
    private static List<Quantile> Ascending(IReadOnlyList<Quantile> quantiles)
    {
        var ascending = new List<Quantile>(quantiles.Count);
        var highest = double.NegativeInfinity;
        foreach (var quantile in quantiles)
        {
            highest = Math.Max(highest, quantile.Profit);
            ascending.Add(quantile with { Profit = highest });
        }
        return ascending;
    }

    private (double[]? Independent, double[]? Theoretical) Attribution(string book, EvidenceDay[] days)
    {
        var pairs = days.Where(d => d.Profit is not null && _independent.ContainsKey((d.Date, book))).TakeLast(SupervisoryMultipliers.Days).ToList();
        return pairs.Count == 0 ? (null, null) : ([.. pairs.Select(d => _independent[(d.Date, book)])], [.. pairs.Select(d => d.Profit!.Value)]);
    }

    private static int[] Histogram(EvidenceDay[] days)
    {
        var bins = new int[Bins];
        foreach (var day in days)
        {
            if (day.P is { } p) bins[Math.Min(Bins - 1, (int)(p * Bins))]++;
        }
        return bins.Sum() == 0 ? [] : bins;
    }

    // The books below it that lost most.
    private List<BookAmount> Losers(string book, DateOnly date)
    {
        var node = _tree.IndexOf(book);
        var below = Enumerable.Range(node + 1, _tree.Books.Count - node - 1).TakeWhile(n => _tree.DepthOf(n) > _tree.DepthOf(node));
        return [.. below.Where(n => !_tree.ChildrenOf(n).Any()).Select(n => (Name: _tree.Books[n].Name, Profit: Hypothetical(n, date))).Where(b => b.Profit < 0)
            .OrderBy(b => b.Profit).ThenBy(b => b.Name, StringComparer.Ordinal).Take(BooksNamed).Select(b => new BookAmount(b.Name, b.Profit!.Value))];
    }

    private double? Hypothetical(int node, DateOnly date) =>
        _walk.Count > 0 ? ForecastOf(date, _tree.Books[node].Name)?.Theoretical : _count.HypotheticalOf(_tree.Books[node].Name, date);

    private BookForecast? ForecastOf(DateOnly date, string book) => _forecasts.TryGetValue(date, out var books) ? books.GetValueOrDefault(book) : null;

    private static LevelForecast? Level(BookForecast book, Confidence confidence)
    {
        foreach (var level in book.Levels)
        {
            if (level.Confidence == confidence) return double.IsFinite(level.Var) ? level : level with { Var = double.NaN };
        }
        return null;
    }
}
