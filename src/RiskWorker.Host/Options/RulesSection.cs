using RiskWorker.Domain.Limits;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>rules</c>: published rules whose measures, history and limits are filled in.</summary>
internal static class RulesSection
{
    /// <summary>Reads the list; absent means none.</summary>
    public static IReadOnlyList<RuleChoice> Read(SettingsValue? value)
    {
        var choices = new List<RuleChoice>();
        foreach (var item in value?.Items() ?? [])
        {
            if (Choice(item) is not { } choice) continue;
            if (choices.Exists(c => c.Set == choice.Set && c.Book == choice.Book)) item.Fault("each rule set once for a book");
            else choices.Add(choice);
        }
        return choices;
    }

    private static RuleChoice? Choice(SettingsValue item)
    {
        if (item.Section("set", "book", "referenceBook") is not { } section) return null;
        var expected = "one of " + string.Join(", ", RuleSets.All.Select(r => r.Name));
        if (section.Required("set", expected)?.Text(expected) is not { } name) return null;
        if (RuleSets.Find(name) is not { } rule)
        {
            section["set"]!.Value.Fault(expected);
            return null;
        }
        if (rule.HasLimits) return section.Required("book", "the book that the limit binds")?.Text("the name of a book") is { } book ? new(name, book, section["referenceBook"]?.Text("the name of a book")) : null;
        section["book"]?.Fault($"no book: '{name}' sets no limit");
        section["referenceBook"]?.Fault($"no reference book: '{name}' sets no limit");
        return new(name, null, null);
    }
}
