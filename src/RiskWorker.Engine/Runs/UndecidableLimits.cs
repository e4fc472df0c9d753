using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Checks;

namespace RiskWorker.Engine.Runs;

/// <summary>Findings on limits that no number of scenarios can decide: relative to a value that is not positive.</summary>
public static class UndecidableLimits
{
    /// <summary>A finding for each book concerned.</summary>
    public static IEnumerable<Finding> Findings(LookOutcome outcome, IReadOnlyList<Limit> limits, CheckSettings settings) =>
        from limit in limits
        let clause = outcome.Evaluator.Undecidable(limit)
        where clause is not null
        group $"'{limit.Name}' ({clause})" by limit.Book into undecidable
        select FindingCodes.LimitUndecidable.Found(settings, undecidable.Key,
            $"{undecidable.Count()} limits of this book cannot be decided by any number of scenarios: {string.Join(", ", undecidable.Take(10))}. Give them an amount in money instead.");
}
