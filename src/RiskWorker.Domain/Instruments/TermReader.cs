using System.Globalization;

namespace RiskWorker.Domain.Instruments;

/// <summary>Reads the terms of one row one by one and gathers what is wrong with them; a faulty term reads as an empty value.</summary>
internal sealed class TermReader(IReadOnlyDictionary<string, string> terms)
{
    public List<TermFault> Faults { get; } = [];

    public string? OptionalText(string term) => terms.GetValueOrDefault(term);

    public string Text(string term) => OptionalText(term) ?? Missing(term, "a name");

    public double Positive(string term)
    {
        if (OptionalText(term) is not { } text) return Missing<double>(term, "a number above 0");
        return Number(text, out var value) && value > 0 ? value : Wrong<double>(term, text, "a number above 0");
    }

    public double Multiplier()
    {
        if (OptionalText("multiplier") is not { } text) return 1;
        return Number(text, out var value) && value != 0 ? value : Wrong<double>("multiplier", text, "a number other than 0");
    }

    public DateOnly Date(string term)
    {
        if (OptionalText(term) is not { } text) return Missing<DateOnly>(term, "a date as yyyy-MM-dd");
        return DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out var date)
            ? date : Wrong<DateOnly>(term, text, "a date as yyyy-MM-dd");
    }

    public T Choice<T>(string term) where T : struct, Enum
    {
        if (OptionalText(term) is not { } text) return Missing<T>(term, Choices<T>.Expected);
        foreach (var (spelling, value) in Choices<T>.All)
        {
            if (text == spelling) return value;
        }
        return Wrong<T>(term, text, Choices<T>.Expected);
    }

    public RateTerm? Rate(string term)
    {
        if (OptionalText(term) is not { } text) return null;
        return Number(text, out var flat) ? RateTerm.Of(flat) : RateTerm.From(text);
    }

    public Underlying Underlying()
    {
        var (factor, currency) = (OptionalText("factor"), OptionalText("base_currency"));
        if (factor is null && currency is null) Missing("factor", "a factor, or a currency in base_currency");
        if (factor is not null && currency is not null) Wrong<int>("base_currency", currency, "nothing, since factor is given");
        return new(factor, currency);
    }

    public VolatilityTerm Volatility()
    {
        var (flat, factor) = (OptionalText("vol"), OptionalText("vol_factor"));
        if (flat is null && factor is null) Missing("vol", "a number above 0, or a factor in vol_factor");
        if (flat is not null && factor is not null) Wrong<int>("vol_factor", factor, "nothing, since vol is given");
        return flat is not null && factor is null ? new(Positive("vol"), null) : new(null, factor);
    }

    public static bool Number(string text, out double value) =>
        double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out value) && double.IsFinite(value);

    private string Missing(string term, string expected)
    {
        Faults.Add(new(term, "", expected));
        return "";
    }

    private T Missing<T>(string term, string expected) where T : struct => Wrong<T>(term, "", expected);

    private T Wrong<T>(string term, string found, string expected) where T : struct
    {
        Faults.Add(new(term, found, expected));
        return default;
    }

    /// <summary>How the members of an enumeration are spelt, made once: hundreds of thousands of instruments choose.</summary>
    private static class Choices<T> where T : struct, Enum
    {
        public static readonly (string Spelling, T Value)[] All = [.. Enum.GetValues<T>().Select(v => (v.ToString().ToLowerInvariant(), v))];
        public static readonly string Expected = "one of " + string.Join(", ", Enum.GetNames<T>()).ToLowerInvariant();
    }
}
