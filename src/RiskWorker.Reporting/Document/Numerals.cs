using System.Globalization;

namespace RiskWorker.Reporting.Document;

/// <summary>
/// The one place where figures become text: a comma between thousands, a point before decimals, the true minus U+2212
/// (as wide as a digit in the embedded typeface), whatever the culture.
/// </summary>
public static class Numerals
{
    /// <summary>The minus sign U+2212.</summary>
    public const string Minus = "\u2212";

    /// <summary>What stands where there is no figure.</summary>
    public const string Missing = "–";

    private static readonly NumberFormatInfo Format = new()
    {
        NegativeSign = Minus,
        NumberGroupSeparator = ",",
        NumberDecimalSeparator = ".",
        NumberGroupSizes = [3],
        NumberNegativePattern = 1,
    };

    /// <summary>A figure with a fixed number of decimals; one that rounds to zero carries no sign.</summary>
    /// <param name="value">The figure; not finite gives <see cref="Missing"/>.</param>
    /// <param name="decimals">Digits after the point, 0 to 15.</param>
    public static string Fixed(double value, int decimals = 0)
    {
        if (!double.IsFinite(value))
            return Missing;

        var text = value.ToString("N" + decimals.ToString(CultureInfo.InvariantCulture), Format);
        return text.AsSpan().ContainsAnyInRange('1', '9') ? text : text.TrimStart(Minus[0]);
    }

    /// <summary>A figure or, for null, <see cref="Missing"/>.</summary>
    public static string Fixed(double? value, int decimals = 0) => Fixed(value ?? double.NaN, decimals);

    /// <summary>A figure that always carries its sign: a change.</summary>
    public static string Signed(double value, int decimals = 0)
    {
        var text = Fixed(value, decimals);
        return value > 0 && text.AsSpan().ContainsAnyInRange('1', '9') ? "+" + text : text;
    }

    /// <summary>A part of one as a percentage with its sign.</summary>
    public static string Percent(double fraction, int decimals = 0) =>
        double.IsFinite(fraction) ? Fixed(fraction * 100, decimals) + "%" : Missing;

    /// <summary>A confidence level as it was typed: 99%, 97.5%.</summary>
    public static string Confidence(decimal level) => (level * 100m).ToString("0.############", Format) + "%";

    /// <summary>A whole number.</summary>
    public static string Count(long value) => value.ToString("N0", Format);

    /// <summary>An ISO 8601 date.</summary>
    public static string Date(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);
}
