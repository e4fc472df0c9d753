using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Reporting.Tests.Reports;

/// <summary>Builds records of an invented firm: a tree of desks, limits in every status, 250 days of P&amp;L.</summary>
internal sealed class SampleRun
{
    private static readonly MeasureSpec Var = new(MeasureKind.Var, new(0.99m), new(1));
    private static readonly MeasureSpec Es = new(MeasureKind.Es, new(0.975m), new(1));
    private static readonly MeasureSpec TenDays = new(MeasureKind.Var, new(0.99m), new(10));
    private static readonly string[] Words = ["Aurora", "Birch", "Cinder", "Dune", "Ember", "Fjord", "Grove", "Harbour"];

    public int Desks { get; init; } = 3;

    public int BooksPerDesk { get; init; } = 3;

    public int Limits { get; init; } = 10;

    public int Findings { get; init; } = 3;

    public double Scale { get; init; } = 1;

    public string NameSuffix { get; init; } = "";

    public bool First { get; init; }

    public int BacktestDays { get; init; } = 250;

    public RunStatus Status { get; init; } = RunStatus.Degraded;

    private static DateOnly AsOf => new(2026, 11, 27);

    public RunRecord Build()
    {
        var results = Status == RunStatus.Failed
            ? new RunResults { Findings = [.. Found(Findings, FindingSeverity.Blocking)], Firm = new("Halden & Moss Trading", "EUR") }
            : Results();
        return new RunRecord
        {
            Run = "7c41e09bd2f6-1",
            Attempt = 1,
            AsOf = AsOf,
            Status = Status,
            Evidence = EvidenceKind.Recorded,
            Started = new DateTimeOffset(2026, 11, 28, 5, 30, 2, TimeSpan.Zero),
            Finished = new DateTimeOffset(2026, 11, 28, 5, 30, 6, TimeSpan.Zero),
            Version = "0.1.0",
            Epoch = 1,
            Snapshot = SnapshotHash.OfText("snapshot"),
            SettingsHash = SnapshotHash.OfText("settings"),
            Parts = [],
            Command = "riskworker measure --config config-demo --out out --as-of 2026-11-27",
            Settings = new RunSettings { Model = new ModelSettings { Name = "house" } },
            Results = results,
            Figures = SnapshotHash.OfText("figures"),
            Previous = First || Status == RunStatus.Failed ? null : Previous(results),
        };
    }

    private static MeasureResult Measure(MeasureSpec spec, double value, double width = 0.01) =>
        new(spec, value, value * (1 - width), value * (1 + width), 0.99);

    private RunResults Results()
    {
        var nodes = Nodes();
        return new RunResults
        {
            Findings = [.. Found(Findings, FindingSeverity.Warning)],
            Firm = new("Halden & Moss Trading", "EUR"),
            Calibration = new CalibrationSummary
            {
                Shocks = 500,
                DroppedDays = 2,
                From = new(2024, 12, 20),
                To = AsOf,
                Factors = 40,
                Still = 1,
                Rank = 39,
                Plan = SnapshotHash.OfText("plan"),
            },
            Simulation = new(200_000, 1, 2, 5, 0.99, null),
            Nodes = nodes,
            Limits = [.. Enumerable.Range(0, Limits).Select(i => Limit(nodes[i % nodes.Count], i))],
            Backtest = [.. BacktestDays == 0 ? [] : nodes.Take(4).Select(Backtest)],
            Holdings = new Holdings
            {
                Positions = 152,
                Priced = 150,
                GrossValue = 48_250_000 * Scale,
                PreviousGrossValue = 47_900_000 * Scale,
                Reconciled = 140,
                Breaks = [new("firm", "EQ-ALPHA", "USD", 125_000 * Scale, 121_000 * Scale)],
                BreakTotal = 3_700 * Scale,
                Unpriced =
                [
                    new("desk0", "SWAP-17", "swap", 3, 1_250_000 * Scale, "kind swap is not priced yet"),
                    new("desk1", "UNKNOWN-9", "-", -40, null, "instrument is not in instruments.csv"),
                ],
            },
            Methods =
            [
                new("spot", "the closing price", "S", "the price itself", "the close is taken as tradable in any size", 138),
                new("option, european", "log-normal underlying", "closed form", "Black and Scholes 1973", "one volatility whatever the strike: no smile", 12),
            ],
            Adjustments = [new("EQ.ALPHA", new DateOnly(2026, 6, 1), 0.5, "two for one split")],
        };
    }

    private List<NodeResult> Nodes()
    {
        var nodes = new List<NodeResult> { Node("firm", "Halden & Moss" + NameSuffix, null, 0, 412_300, "EUR", 0) };
        for (var desk = 0; desk < Desks; desk++)
        {
            nodes.Add(Node($"desk{desk}", $"{Words[desk % Words.Length]} desk{NameSuffix}", "firm", 1, 190_000 - (11_000 * (desk % 9)), "EUR", 0));
            for (var book = 0; book < BooksPerDesk; book++)
                nodes.Add(Node($"book{desk}.{book}", $"{Words[(desk + book + 3) % Words.Length]} {book + 1}{NameSuffix}", $"desk{desk}", 2, 82_000 - (9_700 * (book % 8)), book == 1 ? "USD" : "EUR", 12));
        }

        return nodes;
    }

    private NodeResult Node(string book, string name, string? parent, int depth, double var, string currency, int positions)
    {
        IReadOnlyList<MeasureResult> Measures(double times) =>
            [Measure(Var, var * Scale * times), Measure(Es, var * 1.004 * Scale * times, 0.008), Measure(TenDays, var * 3.05 * Scale * times)];

        return new NodeResult
        {
            Book = book,
            Name = name,
            Parent = parent,
            Depth = depth,
            Currency = currency,
            Value = var * -38.2 * Scale,
            ValueRoot = var * -38.2 * Scale,
            Positions = positions,
            Measures = Measures(currency == "USD" ? 1.1 : 1),
            MeasuresRoot = currency == "USD" ? Measures(1) : null,
            Distributions = [Distribution(var * Scale)],
        };
    }

    // Bell-shaped by the binomial's own recursion: exact in doubles up to rounding, the same on every machine.
    private static ProfitDistribution Distribution(double var)
    {
        var counts = new long[202];
        var weight = 1e-9;
        for (var i = 1; i <= 200; i++)
        {
            var z = (i - 100.5) / 22;
            weight = 6_000 / (1 + (z * z) + (z * z * z * z * 0.6) + (z * z * z * z * z * z * 0.35));
            counts[i] = (long)weight;
        }

        (counts[0], counts[201]) = (212, 180);
        return new ProfitDistribution
        {
            Horizon = new(1),
            Mean = 0.01 * var,
            Deviation = var / 2.33,
            Low = -1.9 * var,
            High = 1.9 * var,
            Counts = counts,
            Quantiles = [],
        };
    }

    private static LimitResult Limit(NodeResult node, int i)
    {
        var measure = node.Measures[i % 2];
        double[] uses = [1.12, 1.003, 0.87, 0.64, 0.31, 0.72, 0.95, 0.12, 1.4, 0.5];
        var used = uses[i % uses.Length];
        var status = used * 0.99 > 1 ? LimitStatus.Breached : used * 1.01 > 1 ? LimitStatus.Inconclusive : used >= 0.8 ? LimitStatus.Warning : LimitStatus.Within;
        return new LimitResult
        {
            Limit = new(
                $"{node.Name} {(i % 2 == 0 ? "VaR" : "ES")} {i + 1}", node.Book, measure.Spec,
                i % 5 == 3 ? 0.025 : measure.Value / used, i % 5 == 3 ? LimitBasis.Nav : LimitBasis.Amount),
            Currency = node.Currency,
            Value = measure.Value,
            Low = measure.Low,
            High = measure.High,
            Level = 0.99,
            Used = used,
            UsedLow = used * 0.99,
            UsedHigh = used * 1.01,
            Status = status,
            StatusSince = i % 3 == 0 ? AsOf.AddDays(-4) : AsOf,
        };
    }

    private BacktestResult Backtest(NodeResult node)
    {
        var days = new List<BacktestDay>();
        var state = 12345u + (uint)node.Book.Length;
        var date = AsOf.AddDays(-(BacktestDays * 7 / 5) - 2);
        while (days.Count < BacktestDays)
        {
            date = date.AddDays(1);
            if (date.DayOfWeek is DayOfWeek.Saturday or DayOfWeek.Sunday)
                continue;

            var i = days.Count;
            var var = node.Measures[0].Value * (0.8 + (0.2 * i / BacktestDays));
            var profit = (Next() + Next() + Next() + Next() - 2) * 1.15 * var;
            double? missing = i is > 80 and < 83 ? null : var;
            days.Add(new(date, missing, i == 150 ? null : profit, profit * 0.93, missing is null ? null : EvidenceKind.Backfilled));
        }

        int Count(Func<BacktestDay, double?> profit) => days.Count(day => BacktestDay.IsException(day.Var, profit(day)));
        var greater = Math.Max(Count(day => day.Actual), Count(day => day.Hypothetical));
        return new BacktestResult
        {
            Book = node.Book,
            Confidence = new(0.99m),
            Currency = node.Currency,
            Series = days,
            Actual = node.Depth == 2 ? null : Count(day => day.Actual),
            Hypothetical = Count(day => day.Hypothetical),
            MissingVar = days.Count(day => day.Var is null),
            Backfilled = days.Count,
            Zone = BacktestDays < 125 ? null : greater < 5 ? BacktestZone.Green : greater < 10 ? BacktestZone.Yellow : BacktestZone.Red,
        };

        double Next()
        {
            state = (state * 1664525u) + 1013904223u;
            return state / 4294967296.0;
        }
    }

    private static IEnumerable<Finding> Found(int count, FindingSeverity severity) => Enumerable.Range(0, count).Select(i => new Finding(
        severity, i % 2 == 0 ? "stale-price" : "missing-observation", $"observations.csv",
        $"{i + 2} factors were unchanged for 3 or more of their business days: EQ.CINDER.{i}, FX.NOK, VOL.GROVE. Confirm the prices or name a proxy."));

    private static PreviousRun Previous(RunResults results) => new(
        "55aa90c1e4b7-1", AsOf.AddDays(-1), 100_000, "house", SnapshotHash.OfText("settings"),
        [.. results.Nodes.Select(node => new PreviousNode(node.Book, node.Value * 0.99, [.. node.Measures.Select(one => one with { Value = one.Value * 0.97 })]))],
        [.. results.Limits.Skip(1).Select(limit => new PreviousLimit(limit.Limit.Name, (limit.Used ?? 0) * 0.98, limit.Used > 0.94 && limit.Used < 1.05 ? LimitStatus.Within : limit.Status, AsOf.AddDays(-9)))]);
}
