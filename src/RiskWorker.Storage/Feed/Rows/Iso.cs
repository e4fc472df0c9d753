using System.Globalization;

namespace RiskWorker.Storage.Feed.Rows;

/// <summary>Dates as ISO 8601 text.</summary>
internal static class Iso
{
    public static string Of(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    public static string? Of(DateOnly? date) => date is { } given ? Of(given) : null;

    public static DateOnly Date(string text) => TryParse(text, out var date) ? date : throw new FormatException($"'{text}' is not a date as yyyy-MM-dd.");

    public static bool TryParse(ReadOnlySpan<char> text, out DateOnly date)
    {
        date = default;
        if (text.Length != 10 || text[4] != '-' || text[7] != '-') return false;
        var (year, month, day) = (Digits(text[..4]), Digits(text[5..7]), Digits(text[8..]));
        if (year < 1 || month is < 1 or > 12 || day < 1 || day > DateTime.DaysInMonth(year, month)) return false;
        date = new(year, month, day);
        return true;
    }

    /// <summary>The number that the digits make, or -1 where one of them is none.</summary>
    private static int Digits(ReadOnlySpan<char> text)
    {
        var number = 0;
        foreach (var c in text)
        {
            if (!char.IsAsciiDigit(c)) return -1;
            number = 10 * number + (c - '0');
        }
        return number;
    }
}
