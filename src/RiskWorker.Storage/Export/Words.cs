using System.Globalization;

namespace RiskWorker.Storage.Export;

/// <summary>Members, dates and times as exports spell them.</summary>
internal static class Words
{
    public static string Of<T>(T member) where T : struct, Enum => Feed.Rows.Spelling.Of(member);

    public static string Date(DateOnly date) => Feed.Rows.Iso.Of(date);

    public static string? Date(DateOnly? date) => Feed.Rows.Iso.Of(date);

    public static string Utc(DateTimeOffset time) => time.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss.fff'Z'", CultureInfo.InvariantCulture);
}
