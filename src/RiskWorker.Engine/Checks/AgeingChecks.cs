using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;

namespace RiskWorker.Engine.Checks;

/// <summary>What can be found once a book has been aged: lines that end or change inside the longest horizon, and lines that cannot follow the valuation date.</summary>
public static class AgeingChecks
{
    /// <summary>All findings.</summary>
    /// <param name="ageing">What the instruments turn into.</param>
    /// <param name="tree">The books.</param>
    /// <param name="lines">The lines.</param>
    /// <param name="longest">The longest horizon.</param>
    /// <param name="settings">Severities.</param>
    public static IReadOnlyList<Finding> Run(BookAgeing ageing, BookTree tree, IReadOnlyList<LineValue> lines, Horizon longest, CheckSettings settings)
    {
        var findings = new FindingList(settings);
        var held = lines.Where(l => l.Unpriced is null && tree.IndexOf(l.Position.Book) >= 0).Select(l => l.Position.Instrument).ToList();
        Add(FindingCodes.LineExpires, i => ageing.Of(i, longest).Event, count => $"{(count == 1 ? "expires, pays or is" : "expire, pay or are")} fixed inside {longest}");
        Add(FindingCodes.LineNotAged, i => ageing.Of(i, longest).Refusal, count => $"{(count == 1 ? "keeps" : "keep")} the valuation date of today");
        return findings.Ordered();

        void Add(FindingCode code, Func<string, string?> clauseOf, Func<int, string> verb)
        {
            var found = held.Where(i => clauseOf(i) is not null).ToList();
            if (found.Count == 0) return;
            string[] names = [.. found.Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal).Select(i => $"{i} ({clauseOf(i)})")];
            findings.Add(code, "positions.csv", $"{FindingList.Count(found.Count, "line", "lines")} {verb(found.Count)}: {FindingList.Names(names)}");
        }
    }
}
