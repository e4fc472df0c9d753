using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Checks;

namespace RiskWorker.Engine.Runs;

/// <summary>Findings on limits that no number of scenarios can decide: relative to a value that is not positive.</summary>
public static class UndecidableLimits
{
    /// <summary>A finding for each book concerned.</summary>
    public static IReadOnlyList<Finding> Of(LookOutcome outcome, IReadOnlyList<Limit> limits, CheckSettings settings)
    {
        var findings = new FindingList(settings);
        var clauses = limits.Select(l => (l.Book, l.Name, Clause: outcome.Evaluator.Undecidable(l))).Where(l => l.Clause is not null);
        foreach (var book in clauses.GroupBy(l => l.Book, StringComparer.Ordinal))
        {
            var names = book.Select(l => $"'{l.Name}' ({l.Clause})").ToList();
            findings.Add(FindingCodes.LimitUndecidable, book.Key, $"{FindingList.Count(names.Count, "limit", "limits")} of this book cannot be decided: {FindingList.Names(names)}");
        }
        return findings.Ordered();
    }
}
