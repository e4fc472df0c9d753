using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Checks;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Tests.Checks;

/// <summary>Runs the checks and picks one code's finding.</summary>
internal static class FindingsOf
{
    public static Finding One(this IEnumerable<Finding> findings, FindingCode code) => Assert.Single(findings, f => f.Code == code.Code);

    public static void None(this IEnumerable<Finding> findings, FindingCode code) => Assert.DoesNotContain(findings, f => f.Code == code.Code);

    public static IReadOnlyList<Finding> Feed(FridaySnapshot builder) => FeedChecks.Run(builder.Build());

    public static IReadOnlyList<Finding> Valuation(FridaySnapshot builder)
    {
        var snapshot = builder.Build();
        var (tree, today, previous) = Valued(snapshot);
        return ValuationChecks.Run(snapshot, tree, today, previous);
    }

    public static Holdings Holdings(FridaySnapshot builder)
    {
        var snapshot = builder.Build();
        var (tree, today, previous) = Valued(snapshot);
        return HoldingsSummary.Of(snapshot, new(tree.ReportingCurrency, snapshot.Factors), new ClosingLevels(snapshot).At(snapshot.AsOf), today, previous);
    }

    private static (BookTree Tree, LineValue[] Today, LineValue[]? Previous) Valued(Snapshot snapshot)
    {
        var tree = BookTree.Build(snapshot.Books).Tree!;
        var levels = new ClosingLevels(snapshot);
        var binder = new InstrumentBinder(tree.ReportingCurrency, snapshot.Factors, levels, snapshot.Settings.Simulation.Seed, snapshot.Settings.CurveInterpolation);
        var today = LineValuation.Of(snapshot.Positions, snapshot.Instruments, binder, levels.At(snapshot.AsOf), snapshot.AsOf);
        var previous = snapshot.Previous is { } p ? LineValuation.Of(p.Positions, snapshot.Instruments, binder, levels.At(p.Date), p.Date) : null;
        return (tree, today, previous);
    }
}
