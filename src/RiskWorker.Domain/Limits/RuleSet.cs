using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Limits;

/// <summary>
/// Measures, history and limits as a published rule gives them: an aid to calculation, designed with reference to the rule, no legal
/// opinion on it. Local regulation and the firm's own policy decide.
/// </summary>
/// <param name="Name">Its name in the settings.</param>
/// <param name="Title">The rule as its readers call it.</param>
/// <param name="Measures">What it measures.</param>
/// <param name="FewestDays">Days of history that it asks for at least.</param>
/// <param name="IsStressed">Whether the measure is also taken on a stressed span of 250 days.</param>
/// <param name="Absolute">Largest measure as a fraction of the book's value; null where it sets no limit.</param>
/// <param name="Relative">Largest measure as a multiple of the same of a reference book; null where it sets no limit.</param>
/// <param name="Figures">Its figures in words.</param>
/// <param name="Source">Where they are published.</param>
public sealed record RuleSet(
    string Name, string Title, IReadOnlyList<MeasureSpec> Measures, int FewestDays, bool IsStressed, double? Absolute, double? Relative, string Figures, string Source)
{
    /// <summary>Whether it limits a book, which must then be named.</summary>
    public bool HasLimits => Absolute is not null;
}

/// <summary>A rule set as chosen in the settings.</summary>
/// <param name="Set">Its name.</param>
/// <param name="Book">The book that its limits bind; null where it has none.</param>
/// <param name="ReferenceBook">The book compared with: then the relative limit stands, else the absolute one.</param>
public sealed record RuleChoice(string Set, string? Book, string? ReferenceBook);

/// <summary>The rule sets that there are.</summary>
public static class RuleSets
{
    private static readonly Confidence s_99 = new(0.99m);
    private static readonly Confidence s_975 = new(0.975m);

    /// <summary>Every rule set.</summary>
    public static IReadOnlyList<RuleSet> All { get; } =
    [
        new("internal-model-var", "Internal-model capital before the trading-book review", [new(MeasureKind.Var, s_99, new(10))], 250, true, null, null,
            "VaR 99%, 10 days, at least one year of history; the same on a continuous stressed period of 250 days",
            "Regulation (EU) 575/2013, article 365(1) and (2) as first in force; 12 CFR 217.205 and 217.206"),
        new("internal-model-es", "Expected shortfall under the trading-book review",
            [new(MeasureKind.Es, s_975, new(10)), new(MeasureKind.Les, s_975, new(10))], 250, true, null, null,
            "ES 97.5%, base horizon 10 days, each factor at its liquidity horizon by the cascade; a stressed period of 250 days beside it",
            "Basel Committee, MAR33.2 to MAR33.6 and MAR33.12"),
        new("ucits-var", "Global exposure of a UCITS by VaR", [new(MeasureKind.Var, s_99, new(20))], 250, false, 0.20, 2.0,
            "VaR 99%, 20 business days, at least 250 days of history; absolute: at most 20% of net asset value; relative: at most 200% of the reference portfolio's",
            "CESR/10-788, boxes 11 to 15"),
        new("rule-18f-4-var", "Limit on fund leverage risk by VaR", [new(MeasureKind.Var, s_99, new(20))], 756, false, 0.20, 2.0,
            "VaR 99%, 20 trading days, at least three years of history; absolute: at most 20% of net assets; relative: at most 200% of the designated reference portfolio's",
            "17 CFR 270.18f-4; release IC-34084 (2020)"),
    ];

    /// <summary>The rule set of that name, or null.</summary>
    public static RuleSet? Find(string name) => All.FirstOrDefault(r => r.Name == name);

    /// <summary>The limits that the chosen rule sets put on books.</summary>
    public static IEnumerable<Limit> LimitsOf(IEnumerable<RuleChoice> choices) => choices.SelectMany(choice => Find(choice.Set) is { HasLimits: true } rule ? LimitsOf(rule, choice) : []);

    /// <summary>
    /// <paramref name="settings"/> with what its rule sets ask for: their measures, a window of at least their history, and a stressed
    /// model beside the one of record.
    /// </summary>
    public static RunSettings Apply(RunSettings settings)
    {
        ArgumentNullException.ThrowIfNull(settings);
        var rules = settings.Rules.Select(choice => Find(choice.Set)).OfType<RuleSet>().ToList();
        if (rules.Count == 0) return settings;
        var model = settings.Model with { Window = Math.Max(settings.Model.Window, rules.Max(r => r.FewestDays)) };
        var challengers = settings.Challengers.ToList();
        var canBeStressed = model is { Kind: not ModelKind.Stressed, Covariance: not CovarianceEstimator.Given };
        if (canBeStressed && rules.Any(r => r.IsStressed) && !challengers.Exists(c => c.Kind == ModelKind.Stressed))
            challengers.Add(new() { Name = model.Name + ", stressed", Kind = ModelKind.Stressed, Stressed = model });
        return settings with
        {
            Model = model,
            Challengers = [.. challengers.OrderBy(c => c.Name, StringComparer.Ordinal)],
            Measures = [.. settings.Measures.Concat(rules.SelectMany(r => r.Measures)).Distinct().Order()],
        };
    }

    private static IEnumerable<Limit> LimitsOf(RuleSet rule, RuleChoice choice)
    {
        foreach (var measure in rule.Measures)
        {
            yield return choice.ReferenceBook is null
                ? new($"{rule.Name} {choice.Book}", choice.Book!, measure, rule.Absolute!.Value, LimitBasis.Nav, Reason: rule.Source)
                : new($"{rule.Name} {choice.Book}", choice.Book!, measure, rule.Relative!.Value, LimitBasis.Book, choice.ReferenceBook, Reason: rule.Source);
        }
    }
}
