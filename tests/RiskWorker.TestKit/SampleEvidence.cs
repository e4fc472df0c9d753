using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;

namespace RiskWorker.TestKit;

/// <summary>Builds backtest evidence of an invented firm. Counts follow from its days; tests, models and hashes are invented.</summary>
public sealed class SampleEvidence
{
    private static readonly DateOnly s_last = new(2026, 11, 27);
    private static readonly string[] s_words = ["Aurora", "Birch", "Cinder", "Dune", "Ember", "Fjord", "Grove", "Harbour"];

    private static readonly (string Name, string Source)[] s_tests =
    [
        ("kupiec-failures", "Kupiec (1995), proportion of failures"), ("kupiec-first-failure", "Kupiec (1995), time until first failure"),
        ("christoffersen-independence", "Christoffersen (1998), independence"), ("christoffersen-conditional", "Christoffersen (1998), conditional coverage"),
        ("haas-mixed", "Haas (2001), mixed Kupiec test"), ("duration", "Christoffersen and Pelletier (2004), Weibull against exponential"),
        ("acerbi-szekely-z1", "Acerbi and Szekely (2014), Z1"), ("acerbi-szekely-z2", "Acerbi and Szekely (2014), Z2"),
        ("costanzino-curran", "Costanzino and Curran (2015), expected shortfall coverage"),
        ("kolmogorov-smirnov", "Kolmogorov (1933); law by Moscovich and Nadler (2017), Simard and L'Ecuyer (2011)"),
        ("anderson-darling", "Anderson and Darling (1954); law by Marsaglia and Marsaglia (2004)"),
        ("berkowitz", "Berkowitz (2001), Testing density forecasts"), ("berkowitz-tail", "Berkowitz (2001), censored likelihood"),
        ("attribution-spearman", "MAR32.36 to MAR32.38; Spearman (1904)"), ("attribution-kolmogorov-smirnov", "MAR32.39 to MAR32.41; Smirnov (1939)"),
    ];

    public BacktestKind Kind { get; init; } = BacktestKind.Recorded;

    public BacktestPositions Positions { get; init; } = BacktestPositions.Stored;

    /// <summary>Books below the root.</summary>
    public int Books { get; init; } = 4;

    public int Days { get; init; } = 250;

    /// <summary>What profits are multiplied by, a value a book in turn: above 1 a book has too many exceptions.</summary>
    public IReadOnlyList<double> Wildness { get; init; } = [1, 1, 1.5, 0.9, 1.02];

    public double Scale { get; init; } = 1;

    public string NameSuffix { get; init; } = "";

    public string Explanation { get; init; } = "The close of the index jumped on the vote; no position changed on the day.";

    public bool WithModels { get; init; } = true;

    public BacktestEvidence Build()
    {
        var dates = Dates();
        var series = Enumerable.Range(0, Books + 1).SelectMany(book => Series(book, dates)).ToList();
        return new BacktestEvidence
        {
            Kind = Kind,
            Positions = Kind == BacktestKind.WalkForward ? Positions : null,
            From = dates.Count > 0 ? dates[0] : s_last,
            To = s_last,
            Firm = new("Halden & Moss Trading", "EUR"),
            Model = new ModelSettings { Name = "house" },
            Scenarios = 20_000,
            Series = series,
            Exceptions = [.. series.SelectMany(Entries).OrderBy(entry => entry.Explanation is not null).ThenBy(entry => entry.Date).ThenBy(entry => entry.Book, StringComparer.Ordinal)],
            Models = WithModels ? [.. Others(series)] : [],
            Runs = Kind == BacktestKind.WalkForward ? [] : [.. dates.Select((date, i) => new EvidenceRun(date, $"7c41e09bd{i:x3}-1", SnapshotHash.OfText($"run {i}"), Kind == BacktestKind.Recorded ? EvidenceKind.Recorded : EvidenceKind.Backfilled))],
            Inputs = SnapshotHash.OfText("inputs"),
            Command = "riskworker backtest --config config-demo --out out --from 2025-12-12 --to 2026-11-27",
            Made = new DateTimeOffset(2026, 11, 30, 6, 12, 3, TimeSpan.Zero),
            Version = "0.1.0",
            Epoch = 2,
        };
    }

    private static string BookOf(int book) => book == 0 ? "firm" : $"desk{book}";

    private static double Round(double value) => Math.Round(value, 6);

    private List<DateOnly> Dates()
    {
        var dates = new List<DateOnly>();
        for (var date = s_last; dates.Count < Days; date = date.AddDays(-1))
        {
            if (date.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)) dates.Insert(0, date);
        }
        return dates;
    }

    private IEnumerable<BacktestSeries> Series(int book, List<DateOnly> dates)
    {
        foreach (var confidence in (decimal[])[0.975m, 0.99m])
        {
            foreach (var profit in book == 3 ? (ProfitKind[])[ProfitKind.Hypothetical] : [ProfitKind.Actual, ProfitKind.Hypothetical])
                yield return Series(book, new(confidence), profit, [.. dates.Select((date, i) => Day(book, confidence, profit, date, i))]);
        }
    }

    private EvidenceDay Day(int book, decimal confidence, ProfitKind profit, DateOnly date, int i)
    {
        // The sum of four uniforms: near a bell, the same on every machine.
        var state = (uint)((book * 7919) + (i * 104729) + 17);
        var bell = Next() + Next() + Next() + Next() - 2;
        var size = (book == 0 ? 412_300 : 190_000 - (11_000 * (book % 9))) * Scale * (1.1 - (0.2 * i / Math.Max(Days, 1)));
        double? var = book <= 1 && i is 81 or 82 ? null : Round(size * (confidence == 0.99m ? 1 : 0.84));
        double? amount = profit == ProfitKind.Actual && i == 150 ? null : Round(bell * size * 0.72 * Wildness[book % Wildness.Count] * (profit == ProfitKind.Actual ? 0.97 : 1));
        var half = bell / 2;
        double? p = amount is null || var is null ? null : Round(0.5 + (0.5 * half * (1.7 - (0.7 * Math.Abs(half)))));
        return new(date, var, var * 1.15, amount, p, var is null || amount is null || -amount > var);

        double Next()
        {
            for (var turn = 0; turn < 3; turn++) state = (state * 1664525u) + 1013904223u;
            return state / 4294967296.0;
        }
    }

    private BacktestSeries Series(int book, Confidence confidence, ProfitKind profit, EvidenceDay[] days)
    {
        var count = days.Count(day => day.Exception);
        var rate = (double)(1 - confidence.Level);
        var deviation = Math.Sqrt(Days * rate * (1 - rate));
        var (yellow, red) = Days == 250 ? confidence.Level == 0.99m ? (5, 10) : (11, 17) : ((int)((Days * rate) + (1.8 * deviation)) + 1, (int)((Days * rate) + (4.2 * deviation)) + 1);
        var bins = new int[10];
        foreach (var day in days)
        {
            if (day.P is { } p) bins[Math.Min((int)(p * 10), 9)]++;
        }
        return new BacktestSeries
        {
            Book = BookOf(book),
            Name = (book == 0 ? "Halden & Moss" : $"{s_words[(book - 1) % s_words.Length]} desk{(book > s_words.Length ? $" {1 + ((book - 1) / s_words.Length)}" : "")}") + NameSuffix,
            Depth = book == 0 ? 0 : 1,
            Currency = book == 2 ? "USD" : "EUR",
            Confidence = confidence,
            Profit = profit,
            Days = days,
            Count = count,
            Expected = Days * rate,
            Zone = Days < 125 ? null : count >= red ? BacktestZone.Red : count >= yellow ? BacktestZone.Yellow : BacktestZone.Green,
            Multiplier = Days == 250 && confidence.Level == 0.99m ? count switch { < 5 => 0, 5 => 0.2, 6 => 0.26, 7 => 0.33, 8 => 0.38, 9 => 0.42, _ => 0.5 } : null,
            KeepsDeskLimit = Days == 250 ? count <= (confidence.Level == 0.99m ? 12 : 30) : null,
            Tests = [.. s_tests.Select((test, i) => Test(test.Name, test.Source, i, count, Days * rate))],
            Probabilities = bins.Sum() == 0 ? [] : bins,
        };
    }

    private static StatisticalTest Test(string name, string source, int i, int count, double expected)
    {
        if (i >= 13) return new() { Name = name, Source = source, Note = "Not assessable: the firm supplies no hypothetical profit of its own, and the model's would be held against itself." };
        if (i is 6 && count == 0) return new() { Name = name, Source = source, Note = "No loss beyond VaR: Z1 has no value." };
        var statistic = Round(Math.Abs(count - expected) * 0.7 / (1 + (i * 0.3)));
        var p = Round(1 / (1 + (statistic * statistic * (1 + (0.2 * i)))));
        return new() { Name = name, Statistic = statistic, PValue = p, Method = (PValueMethod)(i % 3), Source = source, Note = i == 3 ? "The first day has no day before it." : "" };
    }

    private IEnumerable<ExceptionEntry> Entries(BacktestSeries series) => series.Days.Select((day, i) => (day, i)).Where(one => one.day.Exception).Select(one =>
    {
        var (day, i) = one;
        var explained = Kind != BacktestKind.WalkForward && i % 3 != 0;
        var written = new DateTimeOffset(day.Date.AddDays(1), new TimeOnly(8, 30), TimeSpan.Zero);
        return new ExceptionEntry
        {
            Date = day.Date,
            Book = series.Book,
            Confidence = series.Confidence,
            Profit = series.Profit,
            Currency = series.Currency,
            Amount = day.Profit,
            Var = day.Var,
            Books = day.Profit is { } loss ? [new("desk1", loss * 0.6), new("desk2", loss * 0.3), new("desk3", loss * 0.05)] : [],
            Factors = day.Profit is { } lost ? [new("EQ.ALPHA", lost * 0.5), new("FX.NOK", lost * 0.2), new("EUR.5Y", lost * 0.1)] : [],
            Age = Days - i,
            Explanation = explained ? new(day.Var is null ? ExceptionCause.System : (ExceptionCause)(1 + (i % 2)), day.Var is null ? "The feed of the day before came late; no run was made." : Explanation, "A. Lind", written) : null,
            Corrected = explained && i % 5 == 0 ? [new(ExceptionCause.Intraday, "A hedge was closed at noon.", "B. Moen", written.AddHours(-1))] : [],
        };
    });

    private static IEnumerable<ModelCount> Others(List<BacktestSeries> series) =>
        from model in (string[])["history", "t-copula"]
        from one in series.Where(one => one.Profit == ProfitKind.Hypothetical)
        let count = Math.Max(one.Count - (model == "history" ? 2 : 1), 0)
        select new ModelCount(model, one.Book, one.Confidence, one.Days.Count, count, one.Days.Count < 125 ? null : count < 5 ? BacktestZone.Green : BacktestZone.Yellow, one.Days.Select(day => day.Var ?? 0).DefaultIfEmpty(0).Average() * (model == "history" ? 1.12 : 1.05));
}
