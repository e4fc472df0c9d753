using System.Globalization;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>
/// The curves of a run: all factors of one <c>curve</c> name, tenors ascending. What an instrument names is resolved to places in
/// the factor list, or there is a reason why it cannot be.
/// </summary>
public sealed class CurveSet
{
    private const double HighestRate = 1000; // so that no exponent overflows, whatever the dates

    private static readonly RateCurve s_none = RateCurve.Flat(0);

    private readonly IReadOnlyList<Factor> _factors;
    private readonly CurveInterpolation _interpolation;
    private readonly Dictionary<string, int> _places = new(StringComparer.Ordinal);
    private readonly Dictionary<string, FactorCurve> _curves = new(StringComparer.Ordinal);

    /// <summary>Groups <paramref name="factors"/>, in whose order levels are given, into curves.</summary>
    public CurveSet(IReadOnlyList<Factor> factors, CurveInterpolation interpolation = CurveInterpolation.LinearZero)
    {
        (_factors, _interpolation) = (factors, interpolation);
        for (var j = 0; j < factors.Count; j++) _places[factors[j].Name] = j;
        foreach (var group in Enumerable.Range(0, factors.Count).Where(j => factors[j].Curve is not null).GroupBy(j => factors[j].Curve!, StringComparer.Ordinal))
            _curves[group.Key] = FactorCurve.Of(factors, [.. group]);
    }

    /// <summary>Curves that cannot be used, by name in ordinal order, each with a clause that says why.</summary>
    public IReadOnlyList<(string Curve, string Clause)> Faults =>
        [.. _curves.Where(c => c.Value.Fault is not null).OrderBy(c => c.Key, StringComparer.Ordinal).Select(c => (c.Key, c.Value.Fault!))];

    /// <summary>The rate that <paramref name="term"/> gives: a flat number or a curve of rates.</summary>
    /// <param name="term">A number, or the name of a curve.</param>
    /// <param name="role">The term's name in the feed, for the reason.</param>
    /// <param name="currency">The currency that the curve must be in, or null where any will do; a curve without a currency fits all.</param>
    /// <param name="rates">The rates; meaningless where a reason is returned.</param>
    /// <returns>Null when found, else why not.</returns>
    public Unpriced? Rates(RateTerm term, string role, string? currency, out RateCurve rates)
    {
        rates = s_none;
        if (term.Curve is not { } name) return Flat(term.Flat, role, out rates);
        if (Find(name, role, currency, [FactorClass.Rate], out var curve) is { } fault) return fault;
        rates = new(curve.Points, _interpolation);
        return null;
    }

    /// <summary>The spread that <paramref name="term"/> gives: a flat number, a factor, or a curve, of spreads or rates. A factor comes before a curve of its name.</summary>
    /// <inheritdoc cref="Rates"/>
    public Unpriced? Spreads(RateTerm term, string role, string? currency, out RateCurve rates)
    {
        rates = s_none;
        if (term.Curve is not { } name) return Flat(term.Flat, role, out rates);
        if (_places.TryGetValue(name, out var place))
        {
            if (Check(_factors[place].Class, _factors[place].Currency, $"{role} '{name}'", currency, [FactorClass.Credit, FactorClass.Rate]) is { } unfit) return unfit;
            rates = RateCurve.OfFactor(place);
            return null;
        }
        if (Find(name, role, currency, [FactorClass.Credit, FactorClass.Rate], out var curve) is { } fault) return fault;
        rates = new(curve.Points, _interpolation);
        return null;
    }

    /// <summary>The volatility that <paramref name="term"/> gives: a flat number, a factor, or a curve. A factor comes before a curve of its name.</summary>
    /// <param name="term">A number, or the name of a factor or curve.</param>
    /// <param name="volatilities">The volatilities; meaningless where a reason is returned.</param>
    /// <returns>Null when found, else why not.</returns>
    /// <remarks>The class of a single factor is not looked at, as little as for an option on one factor's volatility before there were curves.</remarks>
    public Unpriced? Volatilities(VolatilityTerm term, out VolatilityCurve volatilities)
    {
        volatilities = VolatilityCurve.Flat(term.Flat ?? 0);
        if (term.Factor is not { } name) return null;
        if (_places.TryGetValue(name, out var place))
        {
            volatilities = VolatilityCurve.OfFactor(place);
            return null;
        }
        if (Find(name, "volatility", null, [FactorClass.Vol], out var curve) is { } fault) return fault;
        volatilities = new(curve.Points);
        return null;
    }

    /// <summary>The zero rate of <paramref name="term"/> at <paramref name="years"/> times that time, for a curve and for a number alike; see <see cref="Rates"/>.</summary>
    /// <returns>Null when found, else why not.</returns>
    public Unpriced? ExponentOf(RateTerm term, string role, string? currency, double years, out LinearForm exponent)
    {
        exponent = LinearForm.Zero;
        if (Rates(term, role, currency, out var rates) is { } fault) return fault;
        exponent = rates.ExponentAt(years);
        return null;
    }

    private static Unpriced? Flat(double rate, string role, out RateCurve rates)
    {
        var isRate = Math.Abs(rate) <= HighestRate;
        rates = isRate ? RateCurve.Flat(rate) : s_none;
        return isRate ? null : new(UnpricedReason.NotModelled, string.Create(CultureInfo.InvariantCulture, $"its {role} of {rate} is no rate, expected a decimal of at most {HighestRate} in size"));
    }

    private Unpriced? Find(string name, string role, string? currency, FactorClass[] classes, out FactorCurve curve)
    {
        if (!_curves.TryGetValue(name, out curve!)) return new(UnpricedReason.UnknownFactor, $"its {role} '{name}' is not in factors.csv");
        if (curve.Fault is { } clause) return new(UnpricedReason.NotModelled, $"its {role} '{name}' is no curve: {clause}");
        return Check(curve.Class, curve.Currency, $"{role} '{name}'", currency, classes);
    }

    private static Unpriced? Check(FactorClass found, string? foundCurrency, string named, string? currency, FactorClass[] classes)
    {
        if (!classes.Contains(found))
            return new(UnpricedReason.NotModelled, $"its {named} is of class {Spelt(found)}, expected {string.Join(" or ", classes.Select(Spelt))}");
        return currency is null || foundCurrency is null || foundCurrency == currency
            ? null
            : new(UnpricedReason.CurrencyMismatch, $"its currency is {currency} but its {named} is in {foundCurrency}");
    }

    private static string Spelt(FactorClass value) => value.ToString().ToLowerInvariant();
}
