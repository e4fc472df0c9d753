using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Tests.Limits;

/// <summary>Rule sets against the published figures; each set names its source.</summary>
public sealed class RuleSetsTests
{
    // CESR/10-788 boxes 11 to 15 (99%, 20 business days, 250 days, 20% and 200%); 17 CFR 270.18f-4 (99%, 20 days, three years, 20% and 200%);
    // Regulation (EU) 575/2013 article 365 (99%, 10 days, one year); MAR33.2 to MAR33.6 (97.5%, base 10 days).
    [Theory]
    [InlineData("ucits-var", "VaR 99%, 20 days", 250, 0.2, 2.0)]
    [InlineData("rule-18f-4-var", "VaR 99%, 20 days", 756, 0.2, 2.0)]
    [InlineData("internal-model-var", "VaR 99%, 10 days", 250, null, null)]
    [InlineData("internal-model-es", "ES 97.5%, 10 days; Liquidity-adjusted ES 97.5%, 10 days", 250, null, null)]
    public void Set_has_the_published_figures(string name, string measures, int days, double? absolute, double? relative)
    {
        var rule = RuleSets.Find(name)!;
        Assert.Equal((measures, days, absolute, relative), (string.Join("; ", rule.Measures), rule.FewestDays, rule.Absolute, rule.Relative));
        Assert.NotEmpty(rule.Source);
    }

    [Fact]
    public void Limit_is_absolute_without_a_reference_book_and_relative_with_one()
    {
        var limits = RuleSets.LimitsOf([new("ucits-var", "FUND", null), new("rule-18f-4-var", "OTHER", "INDEX")]).ToList();
        Assert.Equal(("FUND", 0.2, LimitBasis.Nav, null), (limits[0].Book, limits[0].Amount, limits[0].Basis, limits[0].ReferenceBook));
        Assert.Equal(("OTHER", 2.0, LimitBasis.Book, "INDEX"), (limits[1].Book, limits[1].Amount, limits[1].Basis, limits[1].ReferenceBook));
        Assert.Equal(2, limits.Select(l => l.Name).Distinct().Count());
    }

    [Fact]
    public void Apply_adds_measures_raises_the_window_and_adds_one_stressed_model()
    {
        var written = new RunSettings { Model = new() { Name = "house", Window = 100 }, Rules = [new("internal-model-var", null, null), new("rule-18f-4-var", "FUND", null)] };
        var applied = RuleSets.Apply(written);
        Assert.Equal(756, applied.Model.Window);
        Assert.Equal(["VaR 99%, 1 day", "ES 97.5%, 1 day", "VaR 99%, 10 days", "VaR 99%, 20 days"], applied.Measures.Select(m => m.ToString()));
        var stressed = Assert.Single(applied.Challengers);
        Assert.Equal((ModelKind.Stressed, "house"), (stressed.Kind, stressed.Stressed!.Name));
        Assert.Equal(applied.Challengers.Count, RuleSets.Apply(applied).Challengers.Count);
    }

    [Fact]
    public void Apply_leaves_a_longer_window_and_settings_without_rules_alone()
    {
        var written = new RunSettings { Model = new() { Window = 1000 }, Rules = [new("ucits-var", "FUND", null)] };
        Assert.Equal(1000, RuleSets.Apply(written).Model.Window);
        var without = new RunSettings();
        Assert.Same(without, RuleSets.Apply(without));
    }
}
