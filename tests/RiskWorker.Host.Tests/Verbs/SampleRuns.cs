using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Tests.Verbs;

/// <summary>An invented run: two books, one of them with a name that would be markup, and four limits, one of each status.</summary>
internal static class SampleRuns
{
    public static readonly MeasureSpec Var = new(MeasureKind.Var, new(0.99m), new(1));
    public static readonly MeasureSpec Es = new(MeasureKind.Es, new(0.975m), new(10));

    public static RunRecord Record(RunStatus status = RunStatus.Degraded) => new()
    {
        Run = "r-0123456789ab",
        Attempt = 1,
        AsOf = new(2026, 11, 27),
        Status = status,
        Evidence = EvidenceKind.Recorded,
        Started = DateTimeOffset.UnixEpoch,
        Finished = DateTimeOffset.UnixEpoch,
        Version = "0.1.0",
        Epoch = 1,
        Snapshot = new('a', 64),
        SettingsHash = new('b', 64),
        Parts = [],
        Command = "riskworker measure",
        Settings = new(),
        Figures = new('c', 64),
        Results = new()
        {
            Firm = new("Sample Firm", "EUR"),
            Findings = [new(FindingSeverity.Warning, "PRICE-STALE", "observations.csv", "2 factors did not move for 3 days: AAA, BBB.")],
            Simulation = new(100_000, 1, 2, 5, 0.99, null),
            Nodes = [Node("FIRM", null, 0), Node("[red]DESK[/]", "FIRM", 1)],
            Limits = [Limit("L-within", LimitStatus.Within), Limit("L-warned", LimitStatus.Warning), Limit("L-breached", LimitStatus.Breached), Limit("L-open", LimitStatus.Inconclusive)],
        },
    };

    public static MeasureReport Report(ExitCode code = ExitCode.Breach) =>
        new() { Record = Record(), Folder = "/out/x", Documents = ["/out/x/limit-report.pdf"], Json = "{ \"schema\": 1 }\n", ExitCode = code };

    private static NodeResult Node(string book, string? parent, int depth) => new()
    {
        Book = book,
        Name = book,
        Parent = parent,
        Depth = depth,
        Currency = "EUR",
        Value = 1_000_000,
        ValueRoot = 1_000_000,
        Positions = 1,
        Measures = [new(Var, 316_285.6, 314_900.2, 317_649.7, 0.99), new(Es, 987.654, 980.1, null, 0.99)],
        Distributions = [],
    };

    private static LimitResult Limit(string name, LimitStatus status) => new()
    {
        Limit = new(name, "[red]DESK[/]", Var, 300_000),
        Currency = "EUR",
        Value = 316_285.6,
        Low = 314_900.2,
        High = 317_649.7,
        Level = 0.99,
        Used = 1.0542853,
        UsedLow = 1.04,
        UsedHigh = 1.06,
        Status = status,
    };
}
