using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Reports;

namespace RiskWorker.Reporting.Tests.Reports;

public sealed class EffectsSectionTests
{
    private static readonly MeasureSpec s_var = new(MeasureKind.Var, new(0.99m), new(1));
    private static readonly MeasureSpec s_tenDays = new(MeasureKind.Var, new(0.99m), new(10));

    [Fact]
    public void Run_that_tried_nothing_has_no_section() => Assert.DoesNotContain("What the choices do", Text(null), StringComparison.Ordinal);

    [Fact]
    public void Choice_is_shown_with_what_it_changes() =>
        Assert.Contains("zero expected return the mean shock as drift 90.0 −10.0%", Text(new() { Scenarios = 16_384, Choices = [new("zero expected return", "the mean shock as drift", [new(s_var, 100_000, 90_000)])] }), StringComparison.Ordinal);

    [Fact]
    public void Classes_are_added_and_held_against_all_together()
    {
        var text = Text(new()
        {
            Scenarios = 16_384,
            Classes = [new(FactorClass.Equity, [new(s_var, 100_000, 80_000)]), new(FactorClass.Vol, [new(s_var, 100_000, 45_000)])],
        });
        Assert.Contains("Equity prices 80.0 Volatilities 45.0 Added, as if all fell together 125.0 All classes moving as they are correlated 100.0 80% of the sum", text, StringComparison.Ordinal);
    }

    [Fact]
    public void Root_of_time_is_called_a_comparison() =>
        Assert.Contains("VaR 99%, 10 days 300.0 316.2 1.05 A comparison only", Text(new() { Scenarios = 16_384, RootsOfTime = [new(s_tenDays, 300_000, 316_228)] }), StringComparison.Ordinal);

    [Fact]
    public void Filled_days_are_shown_with_what_they_do_to_volatility_and_correlation()
    {
        var text = Text(new() { Scenarios = 16_384, Fills = [new("Newco", "Index", 75, 0.75, 0.012, 0.02, "Oldco", 0.8, 0.35), new("Latest", "Index", 99, 0.99, 0.01, null, null, null, null)] });
        Assert.Contains("Newco Index 75 75% 1.20% 2.00% 0.80 0.35 Oldco", text, StringComparison.Ordinal);
        Assert.Contains("Latest Index 99 99% 1.00% – – – –", text, StringComparison.Ordinal);
    }

    [Fact]
    public void Rule_sets_stand_on_the_method_page_as_an_aid()
    {
        var run = new SampleRun().Build();
        var text = DocumentText.Of(LimitReport.Build(run with { Settings = run.Settings with { Rules = [new RuleChoice("ucits-var", run.Results.Nodes[0].Book, null)] } }));
        Assert.Contains("Global exposure of a UCITS by VaR", text, StringComparison.Ordinal);
        Assert.Contains("designed with reference to these rules; no legal opinion", text, StringComparison.Ordinal);
        Assert.DoesNotContain("Rule sets", DocumentText.Of(LimitReport.Build(run)), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(true, "is reached.")]
    [InlineData(false, "was not reached at the cap of scenarios.")]
    public void Page_one_says_whether_the_precision_asked_for_is_reached(bool reached, string words)
    {
        var run = new SampleRun().Build();
        run = run with
        {
            Settings = run.Settings with { Simulation = run.Settings.Simulation with { Precision = 0.005 } },
            Results = run.Results with { Simulation = run.Results.Simulation! with { PrecisionReached = reached } },
        };
        Assert.Contains($"a half-width of 0.50% of the top node's figures, {words}", DocumentText.Of(LimitReport.Build(run).Sections[0]), StringComparison.Ordinal);
    }

    private static string Text(RunEffects? effects)
    {
        var run = new SampleRun { Desks = 1 }.Build();
        return DocumentText.Of(LimitReport.Build(run with { Results = run.Results with { Effects = effects } }));
    }
}
