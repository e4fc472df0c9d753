using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests.Runs;

/// <summary>What a choice does to the top node, on normal losses whose measures are known.</summary>
public sealed class ChoiceEffectsTests
{
    private const double NormalQuantile = 2.3263478740408408; // Phi^-1(0.99)

    private static readonly MeasureSpec s_oneDay = new(MeasureKind.Var, new(0.99m), new(1));
    private static readonly MeasureSpec s_tenDays = new(MeasureKind.Var, new(0.99m), new(10));
    private static readonly RunEffects s_effects = Effects([s_oneDay, s_tenDays]);

    [Fact]
    public void Each_class_is_measured_with_the_others_held_still()
    {
        Assert.Equal([FactorClass.Equity, FactorClass.Commodity], s_effects.Classes.Select(c => c.Class));
        AssertNear(3 * NormalQuantile, Otherwise(s_effects.Classes[0].Measures, s_oneDay));
        AssertNear(4 * NormalQuantile, Otherwise(s_effects.Classes[1].Measures, s_oneDay));
        AssertNear(5 * NormalQuantile, s_effects.Classes[0].Measures.Single(m => m.Spec == s_oneDay).Value);
    }

    [Fact]
    public void Ten_days_of_independent_normal_days_are_the_root_of_ten_times_one()
    {
        var root = Assert.Single(s_effects.RootsOfTime);
        Assert.Equal(s_tenDays, root.Spec);
        Assert.Equal(root.Simulated, root.Scaled, 1e-9);
    }

    [Fact]
    public void Root_of_time_is_drawn_where_nothing_is_measured_over_one_day()
    {
        var root = Assert.Single(Effects([s_tenDays]).RootsOfTime);
        AssertNear(root.Simulated, root.Scaled);
    }

    [Fact]
    public void Run_without_challengers_tries_nothing() => Assert.Null(Book([s_oneDay], []).Results().Effects);

    [Fact]
    public void Given_covariance_has_no_other_estimate() => Assert.DoesNotContain(s_effects.Choices, c => c.Choice.Contains("covariance", StringComparison.Ordinal));

    private static double Otherwise(IEnumerable<PairedMeasure> measures, MeasureSpec spec) => measures.Single(m => m.Spec == spec).Otherwise;

    // Four standard errors of the 99% quantile of 16,384 normal draws are 4%.
    private static void AssertNear(double expected, double actual) => Assert.InRange(actual / expected, 0.96, 1.04);

    private static RunEffects Effects(MeasureSpec[] measures)
    {
        var challenger = new ModelSettings { Name = "fat tails", Kind = ModelKind.StudentT, DegreesOfFreedom = 5, Covariance = CovarianceEstimator.Given };
        return Book(measures, [challenger]).Results().Effects!;
    }

    private static NormalBook Book(MeasureSpec[] measures, ModelSettings[] challengers) => new(NormalBook.Normal("A", FactorClass.Equity), NormalBook.Normal("B"))
    {
        Deviations = [3, 4],
        Settings = new() { Measures = measures, Challengers = challengers, Simulation = new() { Scenarios = 50_000 } },
    };
}
