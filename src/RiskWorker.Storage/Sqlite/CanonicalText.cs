using System.Buffers;
using System.Globalization;
using System.Text;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// Rows as text whose hash depends on every value and on nothing else: fields escaped so that no two rows look alike,
/// numbers by their 64 bits, rows in ordinal order whatever the order they were added in. <see cref="CanonicalRow"/> reads them again.
/// The rows stand in one buffer as UTF-8 from the start: a million of them are no million strings.
/// </summary>
internal sealed class CanonicalText
{
    private const int NumberLength = 16;

    private readonly ArrayBufferWriter<byte> _rows = new();
    private readonly List<(int Start, int Length)> _ends = [];
    private int _start;

    public CanonicalText Text(string? text)
    {
        if (text is null) Bytes("\\0"u8);
        else if (text.AsSpan().IndexOfAny("\\\t\n") < 0) Utf8(text);
        else Utf8(text.Replace("\\", "\\\\", StringComparison.Ordinal).Replace("\t", "\\t", StringComparison.Ordinal).Replace("\n", "\\n", StringComparison.Ordinal));
        return Tab();
    }

    public CanonicalText Number(double? value)
    {
        if (value is not { } number) return Text(null);
        BitConverter.DoubleToUInt64Bits(number).TryFormat(_rows.GetSpan(NumberLength), out var written, "x16", CultureInfo.InvariantCulture);
        _rows.Advance(written);
        return Tab();
    }

    public CanonicalText Value<T>(T? value) where T : struct, IFormattable => Text(value?.ToString(null, CultureInfo.InvariantCulture));

    public CanonicalText Date(DateOnly? date) => Text(Feed.Rows.Iso.Of(date));

    public void End()
    {
        _ends.Add((_start, _rows.WrittenCount - _start));
        _start = _rows.WrittenCount;
    }

    /// <summary>The leaf of the rows added since the last leaf.</summary>
    public SnapshotLeaf Leaf(string path)
    {
        var rows = _rows.WrittenMemory;
        new CanonicalOrder(rows).Sort(_ends);
        var text = Joined(rows.Span);
        _ends.Clear();
        _rows.ResetWrittenCount();
        _start = 0;
        return new(new(path, SnapshotHash.OfBytes(text)), text);
    }

    private byte[] Joined(ReadOnlySpan<byte> rows)
    {
        var text = new byte[Math.Max(0, _start + _ends.Count - 1)];
        var at = 0;
        foreach (var (start, length) in _ends)
        {
            rows.Slice(start, length).CopyTo(text.AsSpan(at));
            at += length;
            if (at < text.Length) text[at++] = (byte)'\n';
        }
        return text;
    }

    private void Utf8(string text) => _rows.Advance(Encoding.UTF8.GetBytes(text, _rows.GetSpan(Encoding.UTF8.GetMaxByteCount(text.Length))));

    private void Bytes(ReadOnlySpan<byte> bytes) => _rows.Write(bytes);

    private CanonicalText Tab()
    {
        Bytes("\t"u8);
        return this;
    }
}
