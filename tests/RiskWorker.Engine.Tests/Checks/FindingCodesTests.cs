using System.Reflection;
using System.Text.RegularExpressions;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Checks;

namespace RiskWorker.Engine.Tests.Checks;

public sealed partial class FindingCodesTests
{
    [Fact]
    public void All_holds_every_code_once()
    {
        var fields = typeof(FindingCodes).GetFields(BindingFlags.Public | BindingFlags.Static).Select(f => (FindingCode)f.GetValue(null)!).ToArray();

        Assert.True(fields.Length > 30);
        Assert.Equal(fields.Select(f => f.Code).Order(), FindingCodes.All.Select(f => f.Code).Order());
        Assert.Equal(FindingCodes.All.Count, FindingCodes.All.DistinctBy(f => f.Code).Count());
    }

    [Fact]
    public void Every_code_is_lower_case_words_with_a_meaning_and_a_mend()
    {
        Assert.All(FindingCodes.All, code =>
        {
            Assert.Matches(KebabCase(), code.Code);
            Assert.Matches("^[A-Z].*[^.]$", code.Meaning);
            Assert.Matches("^[a-z].*[^.]$", code.Mend);
        });
    }

    [Fact]
    public void SeverityUnder_settings_that_name_the_code_is_theirs_unless_fixed()
    {
        var settings = new CheckSettings
        {
            Severity = new Dictionary<string, FindingSeverity> { ["price-stale"] = FindingSeverity.Blocking, ["factor-missing"] = FindingSeverity.Warning, ["book-tree"] = FindingSeverity.Warning },
        };

        Assert.Equal(FindingSeverity.Blocking, FindingCodes.PriceStale.SeverityUnder(settings));
        Assert.Equal(FindingSeverity.Warning, FindingCodes.FactorMissing.SeverityUnder(settings));
        Assert.Equal(FindingSeverity.Blocking, FindingCodes.BookTree.SeverityUnder(settings));
        Assert.Equal(FindingSeverity.Warning, FindingCodes.PriceJump.SeverityUnder(settings));
    }

    [GeneratedRegex("^[a-z]+(-[a-z]+)+$")]
    private static partial Regex KebabCase();
}
