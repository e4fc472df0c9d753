using System.Globalization;
using System.Text;

namespace RiskWorker.Storage.Feed;

/// <summary>The faults of one file: the first <see cref="Kept"/> in full, the rest counted.</summary>
internal sealed class FaultLog(string file)
{
    public const int Kept = 50;
    private const int ShownLength = 60;

    private readonly List<FeedFault> _first = [];

    public string File => file;

    public IReadOnlyList<FeedFault> First => _first;

    public long Count { get; private set; }

    public void Add(long line, string? column, ReadOnlySpan<char> found, string expected)
    {
        if (Count++ < Kept) _first.Add(new(file, line, column, Shown(found), expected));
    }

    /// <summary>The text as a message can carry it: at most 60 characters, control characters as \uXXXX.</summary>
    private static string Shown(ReadOnlySpan<char> text)
    {
        var shown = new StringBuilder();
        foreach (var c in text[..Math.Min(text.Length, ShownLength)])
        {
            if (char.IsControl(c)) shown.Append(CultureInfo.InvariantCulture, $"\\u{(int)c:x4}");
            else shown.Append(c);
        }
        if (text.Length > ShownLength) shown.Append('…');
        return shown.ToString();
    }
}
