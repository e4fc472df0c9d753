using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Tests;

/// <summary>Records of invented runs with every field filled.</summary>
internal static class RunRecords
{
    public static readonly MeasureSpec OneDayVar = new(MeasureKind.Var, new(0.99m), new(1));

    private static readonly MeasureSpec s_tenDayEs = new(MeasureKind.Es, new(0.975m), new(10));

    public static RunRecord Of(DateOnly asOf, int attempt = 1, string snapshot = "", EvidenceKind evidence = EvidenceKind.Recorded, RunStatus status = RunStatus.Degraded,
        string model = "lognormal", DateOnly? profitFrom = null, double var = 123456.78901234567)
    {
        if (snapshot.Length == 0) snapshot = SnapshotHash.OfText($"inputs of {asOf:O}");
        var record = new RunRecord
        {
            Run = RunIdentity.Of(snapshot, attempt),
            Attempt = attempt,
            AsOf = asOf,
            Status = status,
            Evidence = evidence,
            Started = new(2026, 11, 28, 5, 30, 0, 123, TimeSpan.Zero),
            Finished = new(2026, 11, 28, 5, 30, 4, 567, TimeSpan.Zero),
            Version = "0.1.0",
            Epoch = 1,
            Snapshot = snapshot,
            SettingsHash = SnapshotHash.OfText("settings"),
            Parts = [new("books", SnapshotHash.OfText("books")), new("observations", SnapshotHash.OfText("observations"))],
            Command = "riskworker measure --as-of " + asOf.ToString("O"),
            Settings = new() { Model = new() { Name = model, Drifts = new SortedDictionary<string, double> { ["ALPHA"] = 0.05 } }, Simulation = new() { Seed = ulong.MaxValue, Precision = 0.01 } },
            Results = status == RunStatus.Failed ? new() { Findings = [new(FindingSeverity.Blocking, "no-price", "ALPHA", "There is no price.")] } : Results(asOf, profitFrom, var),
            Figures = "",
            Previous = new("abcdefabcdef", asOf.AddDays(-1), 100_000, model, SnapshotHash.OfText("settings"), [new("ALL", 1e6, [Measure(OneDayVar, 0.1)])], [new("firm-var", 0.5, LimitStatus.Within, asOf.AddDays(-9))]),
            Timings = new(0.1, 0.2, 0.3, 0.4),
        };
        return record with { Figures = FiguresHash.Of(record.Results) };
    }

    private static MeasureResult Measure(MeasureSpec spec, double value) => new(spec, value, value * 0.99, double.IsNaN(value) ? null : value * 1.01, 0.95);

    private static RunResults Results(DateOnly asOf, DateOnly? profitFrom, double var) => new()
    {
        Findings = [new(FindingSeverity.Warning, "stale", "factors", "ALPHA has not moved for 3 days; =SUM(A1) is a strange name.")],
        Firm = new("The firm", "EUR"),
        Calibration = new() { Shocks = 500, DroppedDays = 2, From = asOf.AddDays(-700), To = asOf, Factors = 3, Still = 1, Rank = 2, RepairDistance = 1.0 / 3, Plan = SnapshotHash.OfText("plan") },
        Simulation = new(200_000, ulong.MaxValue, 2, 5, 0.99, true),
        Nodes =
        [
            Node("ALL", null, 0, "EUR", var) with { MeasuresRoot = null },
            Node("FX", "ALL", 1, "USD", var / 7) with { MeasuresRoot = [Measure(OneDayVar, var / 8), Measure(s_tenDayEs, var / 3)] },
        ],
        Limits =
        [
            new()
            {
                Limit = new("firm-var", "ALL", OneDayVar, 250_000.5, LimitBasis.Book, "FX", 0.75, asOf.AddDays(-30), asOf.AddDays(30), "A. Approver", "Yearly review"),
                Currency = "EUR", Value = var, Low = var * 0.99, High = var * 1.01, Level = 0.99, Used = 0.5, UsedLow = 0.49, UsedHigh = 0.51, Status = LimitStatus.Within, StatusSince = asOf.AddDays(-3),
            },
            new()
            {
                Limit = new("fx-es", "FX", s_tenDayEs, 9000, LimitBasis.Nav), Currency = "USD", Value = null, Low = null, High = null, Level = 0.99,
                Used = null, UsedLow = null, UsedHigh = null, Status = LimitStatus.Inconclusive,
            },
        ],
        Backtest =
        [
            new()
            {
                Book = "ALL", Confidence = new(0.99m), Currency = "EUR", Actual = 1, Hypothetical = 2, MissingVar = 1, Backfilled = 1, Zone = null,
                Series = [new(asOf.AddDays(-1), 100.1, -101, null, EvidenceKind.Backfilled), new(asOf, null, 3, 4, null)],
            },
        ],
        Sensitivities =
        [
            new("ALL", "ALPHA", FactorClass.Equity, null, null, SensitivityMeasure.Delta, 1.0 / 3, -0.0),
            new("ALL", "=EUR.3M", FactorClass.Rate, "-EUR", 0.25, SensitivityMeasure.Dv01, -1e-300, null),
            new("FX", "ALPHA-VOL", FactorClass.Vol, null, null, SensitivityMeasure.Vega, double.NaN, null),
            new("FX", "BANK", FactorClass.Credit, "BANKS, all", 5, SensitivityMeasure.Cs01, 12, null),
        ],
        Hypothetical = profitFrom is { } from ? new(from, asOf, [new("ALL", -1.1), new("FX", 2.2)]) : null,
        Holdings = new()
        {
            Positions = 12,
            Priced = 10,
            GrossValue = 1e7 / 3,
            PreviousGrossValue = 0.1 + 0.2,
            Reconciled = 5,
            Breaks = [new("EQ", "ALPHA-S", "EUR", 1.1, 1.2)],
            BreakTotal = 0.1,
            Unpriced = [new("EQ", "BOND-1", "bond", 100, null, "no pricing yet")],
        },
        Methods = [new("spot", "the closing price", "S", "the price itself", "no cost of leaving", 8), new("option, european", "log-normal", "closed form", "Black and Scholes 1973", "no smile", 2)],
        Adjustments = [new("ALPHA", asOf.AddDays(-100), 0.5, "2 for 1")],
    };

    private static NodeResult Node(string book, string? parent, int depth, string currency, double var) => new()
    {
        Book = book,
        Name = "The " + book,
        Parent = parent,
        Depth = depth,
        Currency = currency,
        Value = -0.0,
        ValueRoot = 5e-324,
        Positions = 3,
        Measures = [Measure(OneDayVar, var), Measure(s_tenDayEs, var * 2)],
        Distributions =
        [
            new()
            {
                Horizon = new(1), Mean = double.Epsilon, Deviation = Math.PI, Low = -1e300, High = 1e300, Counts = [1, long.MaxValue, 3],
                Quantiles = [new(1e-5, -1.0 / 3, true), new(0.5, -0.0, false)],
            },
        ],
    };
}
