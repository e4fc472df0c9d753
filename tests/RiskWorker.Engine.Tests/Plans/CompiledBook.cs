using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Tests.Plans;

/// <summary>A snapshot taken as far as its plan.</summary>
internal sealed record CompiledBook(Snapshot Snapshot, BookTree Tree, CalibratedModel Model, RevaluationPlan Plan)
{
    public static CompiledBook Of(Snapshot snapshot, params int[] horizons)
    {
        var tree = BookTree.Build(snapshot.Books).Tree!;
        var model = Calibrator.Calibrate(snapshot);
        var valued = new BookValuation(snapshot, tree, model);
        Assert.All(valued.Today, line => Assert.Null(line.Unpriced));
        Horizon[] days = [.. horizons.Select(h => new Horizon(h))];
        var plan = new PlanCompiler(tree, model, valued.Binder.Currencies, days).Compile(snapshot.Settings.Simulation.Seed, valued.Today, ageing: snapshot.Settings.Model.Ages ? valued.Ageing(snapshot) : null);
        return new(snapshot, tree, model, plan);
    }

    /// <summary>Every loss of the first scenarios, a row a series of the plan.</summary>
    public double[][] Losses(int scenarios)
    {
        var sample = new BlockEvaluator(Plan, 2).Evaluate(BlockRange.From(0, scenarios), new LossSampleReduction(Plan.Rows.Count, scenarios), null, CancellationToken.None);
        return [.. Enumerable.Range(0, sample.Rows).Select(sample.Row)];
    }

    /// <summary>Place of the series of <paramref name="book"/>.</summary>
    public int RowOf(string book, int horizon = 1, bool own = false) =>
        Plan.Rows.ToList().IndexOf(new(Tree.IndexOf(book), Plan.Horizons.ToList().IndexOf(new(horizon)), own));
}
