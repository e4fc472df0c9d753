using System.Globalization;

namespace RiskWorker.Storage.Feed.Rows;

/// <summary>Dates as ISO 8601 text.</summary>
internal static class Iso
{
    public static string Of(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    public static string? Of(DateOnly? date) => date is { } given ? Of(given) : null;

    public static DateOnly Date(string text) => DateOnly.ParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture);
}
