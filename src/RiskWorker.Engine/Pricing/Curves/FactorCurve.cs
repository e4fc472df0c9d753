using System.Globalization;
using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>The factors of one curve name, or why they make no curve.</summary>
internal sealed class FactorCurve
{
    private FactorCurve(FactorClass @class, string? currency, TenorPoints points, string? fault) =>
        (Class, Currency, Points, Fault) = (@class, currency, points, fault);

    /// <summary>Their class.</summary>
    public FactorClass Class { get; }

    /// <summary>The currency that those name which name one; null where none does.</summary>
    public string? Currency { get; }

    /// <summary>The points; meaningless where <see cref="Fault"/> is set.</summary>
    public TenorPoints Points { get; }

    /// <summary>A clause, or null for a sound curve.</summary>
    public string? Fault { get; }

    /// <summary>The curve of the factors at <paramref name="places"/>, at least one.</summary>
    public static FactorCurve Of(IReadOnlyList<Factor> factors, int[] places)
    {
        var first = factors[places[0]];
        var quoted = places.Select(j => factors[j]).FirstOrDefault(f => f.Currency is not null);
        if (FaultOf([.. places.Select(j => factors[j])], first, quoted) is { } fault) return new(first.Class, quoted?.Currency, new([], []), fault);
        int[] ascending = [.. places.OrderBy(j => factors[j].TenorYears)];
        return new(first.Class, quoted?.Currency, new([.. ascending.Select(j => factors[j].TenorYears!.Value)], ascending), null);
    }

    private static string? FaultOf(Factor[] factors, Factor first, Factor? quoted)
    {
        var tenors = new Dictionary<double, string>();
        foreach (var factor in factors)
        {
            if (factor.TenorYears is not { } tenor) return $"its factor '{factor.Name}' has no tenor_years";
            if (!(tenor >= 0 && double.IsFinite(tenor))) return string.Create(CultureInfo.InvariantCulture, $"its factor '{factor.Name}' has a tenor of {tenor} years, expected a number from 0 on");
            if (!tenors.TryAdd(tenor, factor.Name)) return string.Create(CultureInfo.InvariantCulture, $"its factors '{tenors[tenor]}' and '{factor.Name}' have the same tenor of {tenor} years");
            if (factor.Class != first.Class) return $"its factor '{first.Name}' is of class {Spelt(first)} and '{factor.Name}' of class {Spelt(factor)}";
            if (factor.Currency is not null && factor.Currency != quoted!.Currency) return $"its factor '{quoted.Name}' is in {quoted.Currency} and '{factor.Name}' in {factor.Currency}";
        }
        return null;
    }

    private static string Spelt(Factor factor) => factor.Class.ToString().ToLowerInvariant();
}
