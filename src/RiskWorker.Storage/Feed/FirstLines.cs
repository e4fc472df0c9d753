using System.Globalization;

namespace RiskWorker.Storage.Feed;

/// <summary>Where each key of a file was first seen.</summary>
internal sealed class FirstLines<TKey>(IEqualityComparer<TKey>? comparer = null) where TKey : notnull
{
    private readonly Dictionary<TKey, long> _lines = new(comparer);

    /// <summary>Writes down a fault in <paramref name="column"/> when <paramref name="key"/> was seen before.</summary>
    public void Claim(TKey key, CellReader cells, int column, string once)
    {
        if (!_lines.TryAdd(key, cells.Line))
            cells.Fault(column, string.Create(CultureInfo.InvariantCulture, $"{once} once; it stands on line {_lines[key]} already"));
    }
}
