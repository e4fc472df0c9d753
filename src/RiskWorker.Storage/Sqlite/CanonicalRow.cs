using System.Globalization;
using System.Text;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>A row of <see cref="CanonicalText"/>, read field by field in the order in which they were written.</summary>
internal sealed class CanonicalRow
{
    private readonly string[] _fields;
    private int _next;

    private CanonicalRow(string[] fields) => _fields = fields;

    /// <summary>The rows of a text, in its own order.</summary>
    public static IEnumerable<CanonicalRow> Of(string text) => text.Length == 0 ? [] : text.Split('\n').Select(row => new CanonicalRow(row.Split('\t')[..^1]));

    public string? Text()
    {
        var field = _fields[_next++];
        return field == "\\0" ? null : field.Contains('\\', StringComparison.Ordinal) ? Unescaped(field) : field;
    }

    public string Name() => Text() ?? throw new FormatException("A name is missing.");

    public double? Number() => Text() is { } bits ? BitConverter.UInt64BitsToDouble(ulong.Parse(bits, NumberStyles.HexNumber, CultureInfo.InvariantCulture)) : null;

    public double Amount() => Number() ?? throw new FormatException("A number is missing.");

    public T? Value<T>() where T : struct, IParsable<T> => Text() is { } text ? T.Parse(text, CultureInfo.InvariantCulture) : null;

    public T Whole<T>() where T : struct, IParsable<T> => Value<T>() ?? throw new FormatException("A number is missing.");

    public DateOnly? Date() => Text() is { } text ? Iso.Date(text) : null;

    public T Choice<T>() where T : struct, Enum => Spelling.Of<T>()[Name()];

    /// <summary>All fields that are left.</summary>
    public string?[] Rest()
    {
        var rest = new string?[_fields.Length - _next];
        for (var i = 0; i < rest.Length; i++) rest[i] = Text();
        return rest;
    }

    private static string Unescaped(string field)
    {
        var text = new StringBuilder(field.Length);
        for (var i = 0; i < field.Length; i++)
        {
            text.Append(field[i] != '\\' ? field[i] : field[++i] switch { 't' => '\t', 'n' => '\n', var other => other });
        }
        return text.ToString();
    }
}
