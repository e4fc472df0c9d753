namespace RiskWorker.Storage.Feed.Rows;

/// <summary>How the feed spells the members of an enumeration: in lower case.</summary>
internal static class Spelling
{
    public static IReadOnlyDictionary<string, T> Of<T>() where T : struct, Enum => Table<T>.ByText;

    public static string Of<T>(T value) where T : struct, Enum => Table<T>.ByValue[value];

    private static class Table<T> where T : struct, Enum
    {
        public static readonly Dictionary<string, T> ByText = Enum.GetValues<T>().ToDictionary(v => v.ToString().ToLowerInvariant(), StringComparer.Ordinal);
        public static readonly Dictionary<T, string> ByValue = ByText.ToDictionary(p => p.Value, p => p.Key);
    }
}
