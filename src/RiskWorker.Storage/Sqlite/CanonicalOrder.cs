namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// The order of rows of UTF-8 that their UTF-16 has by its units, which is what hashes are pinned to: that of the bytes, but for characters
/// beyond U+FFFF (lead bytes from F0 on), whose surrogates stand before U+E000 to U+FFFF (lead bytes EE and EF).
/// </summary>
internal sealed class CanonicalOrder(ReadOnlyMemory<byte> text) : IComparer<(int Start, int Length)>
{
    private const int BeforeLast = 0xEE, BeyondLast = 0xF0;

    public int Compare((int Start, int Length) x, (int Start, int Length) y)
    {
        var span = text.Span;
        return Compare(span.Slice(x.Start, x.Length), span.Slice(y.Start, y.Length));
    }

    /// <summary>Brings rows into this order. Most come out of an index, or nearly sorted: those cost one look each.</summary>
    public void Sort(List<(int Start, int Length)> rows)
    {
        var shifts = 0;
        for (var i = 1; i < rows.Count; i++)
        {
            var row = rows[i];
            var at = i;
            for (; at > 0 && Compare(rows[at - 1], row) > 0; at--)
            {
                rows[at] = rows[at - 1];
                shifts++;
            }
            rows[at] = row;
            if (shifts <= rows.Count) continue;
            rows.Sort(this);
            return;
        }
    }

    internal static int Compare(ReadOnlySpan<byte> x, ReadOnlySpan<byte> y)
    {
        var at = x.CommonPrefixLength(y);
        if (at == x.Length || at == y.Length) return x.Length - y.Length;
        var (a, b) = (x[at], y[at]);
        return a >= BeforeLast && b >= BeforeLast && (a >= BeyondLast) != (b >= BeyondLast) ? b - a : a - b;
    }
}
