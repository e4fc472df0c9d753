using System.Globalization;
using System.Text;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// Rows as text whose hash depends on every value and on nothing else: fields escaped so that no two rows look alike,
/// numbers by their 64 bits, rows in ordinal order whatever the order they were added in. <see cref="CanonicalRow"/> reads them again.
/// </summary>
internal sealed class CanonicalText
{
    private readonly List<string> _rows = [];
    private readonly StringBuilder _row = new();

    public CanonicalText Text(string? text)
    {
        if (text is null) _row.Append("\\0");
        else if (text.AsSpan().IndexOfAny("\\\t\n") < 0) _row.Append(text);
        else _row.Append(text.Replace("\\", "\\\\", StringComparison.Ordinal).Replace("\t", "\\t", StringComparison.Ordinal).Replace("\n", "\\n", StringComparison.Ordinal));
        _row.Append('\t');
        return this;
    }

    public CanonicalText Number(double? value)
    {
        if (value is { } number) _row.Append(BitConverter.DoubleToUInt64Bits(number).ToString("x16", CultureInfo.InvariantCulture));
        else _row.Append("\\0");
        _row.Append('\t');
        return this;
    }

    public CanonicalText Value<T>(T? value) where T : struct, IFormattable => Text(value?.ToString(null, CultureInfo.InvariantCulture));

    public CanonicalText Date(DateOnly? date) => Text(Feed.Rows.Iso.Of(date));

    public void End()
    {
        _rows.Add(_row.ToString());
        _row.Clear();
    }

    /// <summary>The leaf of the rows added since the last leaf.</summary>
    public SnapshotLeaf Leaf(string path)
    {
        _rows.Sort(string.CompareOrdinal);
        var text = string.Join('\n', _rows);
        _rows.Clear();
        return SnapshotLeaf.Of(path, text);
    }
}
