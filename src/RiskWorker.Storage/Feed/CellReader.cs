using System.Globalization;
using System.Text;
using nietras.SeparatedValues;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Feed;

/// <summary>A number with the text that it was typed as: the text is kept, the value is compared and checked.</summary>
internal readonly record struct TypedNumber(string Text, double Value);

/// <summary>
/// Walks the rows of a CSV file and reads their cells by column of the format, writing every fault down and going on.
/// What a faulty cell returns is a placeholder: <see cref="RowIsSound"/> says whether the row may be used.
/// </summary>
internal sealed class CellReader : IDisposable
{
    private const int LongestName = 200;
    private const int LongestText = 4000;
    private const int PooledNames = 1 << 16;
    private const string WellQuoted = "quotation marks around the whole cell, and doubled inside it";
    private const NumberStyles Decimal = NumberStyles.AllowLeadingSign | NumberStyles.AllowDecimalPoint | NumberStyles.AllowExponent;

    private readonly SepReader _rows;
    private readonly FileFormat _format;
    private readonly FaultLog _faults;
    private readonly HashSet<string> _names = new(StringComparer.Ordinal);
    private readonly HashSet<string>.AlternateLookup<ReadOnlySpan<char>> _pool;
    private readonly int[] _place;
    private int _width;
    private long _faultsBefore;
    private long _nextLine = 1;
    private char[] _unquoted = new char[256];

    /// <summary>Starts before the header of <paramref name="stream"/>, which is read as UTF-8 and stays open.</summary>
    public CellReader(Stream stream, FileFormat format, FaultLog faults)
    {
        stream.Position = 0;
        var text = new StreamReader(stream, Encoding.UTF8, detectEncodingFromByteOrderMarks: false, bufferSize: 1 << 16, leaveOpen: true);
        if (text.Peek() == '\uFEFF') text.Read();
        _rows = (Sep.New(',').Reader() with { HasHeader = false, DisableColCountCheck = true }).From(text);
        (_format, _faults) = (format, faults);
        _pool = _names.GetAlternateLookup<ReadOnlySpan<char>>();
        _place = new int[format.Columns.Count];
        Array.Fill(_place, -1);
    }

    /// <summary>Columns of the file that the format does not know.</summary>
    public List<string> UnknownColumns { get; } = [];

    /// <summary>Rows read so far.</summary>
    public long Rows { get; private set; }

    /// <summary>Line on which the current row starts.</summary>
    public long Line { get; private set; }

    /// <summary>Whether nothing was wrong with the current row so far.</summary>
    public bool RowIsSound => _faults.Count == _faultsBefore;

    /// <summary>Finds the columns; false when rows cannot be read without more of them.</summary>
    public bool ReadHeader()
    {
        var before = _faults.Count;
        if (!Advance())
        {
            if (_faults.Count == before) _faults.Add(1, null, "", "a header row with " + Required());
            return false;
        }
        _width = _rows.Current.ColCount;
        var seen = new HashSet<string>(StringComparer.Ordinal);
        for (var i = 0; i < _width; i++)
        {
            var raw = _rows.Current[i].Span;
            if (!TryUnquote(raw, out var cell)) _faults.Add(Line, null, raw, WellQuoted);
            var name = cell[..Math.Min(cell.Length, LongestName)].ToString();
            if (!seen.Add(name)) _faults.Add(Line, name, name, "each column once");
            var column = ColumnNamed(name);
            if (column >= 0) _place[column] = i;
            else UnknownColumns.Add(name);
        }
        for (var c = 0; c < _place.Length; c++)
        {
            if (_place[c] < 0 && _format.Columns[c].Required) _faults.Add(Line, _format.Columns[c].Name, "", "this column in the header");
        }
        return _faults.Count == before;
    }

    /// <summary>Goes to the next row that has as many cells as the header; blank lines are passed over.</summary>
    public bool Next()
    {
        while (Advance())
        {
            var row = _rows.Current;
            if (row.ColCount == 1 && row.Span.IsEmpty) continue;
            Rows++;
            _faultsBefore = _faults.Count;
            if (row.ColCount == _width)
            {
                if (row.Span.Contains('"')) CheckQuotes();
                if (RowIsSound) return true;
                continue;
            }
            var spans = _nextLine - Line > 1 ? " (a quotation mark opens a cell that ends lines later)" : "";
            _faults.Add(Line, null, string.Create(CultureInfo.InvariantCulture, $"{row.ColCount} cells"), string.Create(CultureInfo.InvariantCulture, $"{_width} as in the header{spans}"));
        }
        return false;
    }

    /// <summary>Writes down that the cell in <paramref name="column"/> is not what was <paramref name="expected"/>.</summary>
    public void Fault(int column, string expected) => Fault(column, Cell(column), expected);

    /// <summary>The same, with what was found given.</summary>
    public void Fault(int column, ReadOnlySpan<char> found, string expected) =>
        _faults.Add(LineOf(column), _format.Columns[column].Name, found, expected);

    /// <summary>Whether the cell is empty or its column left out.</summary>
    public bool IsEmpty(int column) => Cell(column).IsEmpty;

    /// <summary>A name: not empty, no blanks around it, no control characters, at most 200 characters.</summary>
    public string Name(int column)
    {
        var cell = Cell(column);
        if (cell.IsEmpty)
        {
            Fault(column, cell, "a name");
            return "";
        }
        if (!IsName(column, cell)) return "";
        if (_pool.TryGetValue(cell, out var known)) return known;
        var name = cell.ToString();
        if (_names.Count < PooledNames) _names.Add(name);
        return name;
    }

    /// <summary>A name, or null where the cell is empty.</summary>
    public string? OptionalName(int column) => IsEmpty(column) ? null : Name(column);

    /// <summary>A name that hardly repeats (a trade's), or null where the cell is empty.</summary>
    public string? OptionalReference(int column)
    {
        var cell = Cell(column);
        return !cell.IsEmpty && IsName(column, cell) ? cell.ToString() : null;
    }

    /// <summary>Free text, line breaks allowed, or null where the cell is empty.</summary>
    public string? OptionalText(int column)
    {
        var cell = Cell(column);
        if (cell.IsEmpty) return null;
        if (cell.Length > LongestText || cell.Contains('\0')) Fault(column, cell, "text of at most 4000 characters without NUL");
        return cell.ToString();
    }

    /// <summary>A finite number with '.' as decimal point.</summary>
    public TypedNumber Number(int column, string expected = "a number with '.' as decimal point")
    {
        var cell = Cell(column);
        if (double.TryParse(cell, Decimal, CultureInfo.InvariantCulture, out var value) && double.IsFinite(value)) return new(cell.ToString(), value);
        Fault(column, cell, expected);
        return new("", double.NaN);
    }

    /// <summary>A finite number, or null where the cell is empty.</summary>
    public TypedNumber? OptionalNumber(int column, string expected = "a number with '.' as decimal point, or nothing") =>
        IsEmpty(column) ? null : Number(column, expected);

    /// <summary>A finite number for which <paramref name="holds"/>.</summary>
    public TypedNumber Number(int column, string expected, Func<double, bool> holds)
    {
        var number = Number(column, expected);
        if (!double.IsNaN(number.Value) && !holds(number.Value)) Fault(column, expected);
        return number;
    }

    /// <summary>The same, or null where the cell is empty.</summary>
    public TypedNumber? OptionalNumber(int column, string expected, Func<double, bool> holds) =>
        IsEmpty(column) ? null : Number(column, expected, holds);

    /// <summary>A whole number from 1 to <paramref name="most"/>.</summary>
    public int Count(int column, int most = int.MaxValue)
    {
        var cell = Cell(column);
        if (int.TryParse(cell, NumberStyles.None, CultureInfo.InvariantCulture, out var count) && count >= 1 && count <= most) return count;
        Fault(column, cell, most == int.MaxValue ? "a whole number from 1 on" : string.Create(CultureInfo.InvariantCulture, $"a whole number from 1 to {most:N0}"));
        return 1;
    }

    /// <summary>A decimal strictly between 0 and 1.</summary>
    public decimal Fraction(int column)
    {
        var cell = Cell(column);
        if (decimal.TryParse(cell, NumberStyles.AllowDecimalPoint, CultureInfo.InvariantCulture, out var value) && value is > 0 and < 1) return value;
        Fault(column, cell, "a number between 0 and 1, as in 0.99");
        return 0.5m;
    }

    /// <summary>A date of a close: ISO 8601, from 1900 to 2199.</summary>
    public DateOnly Date(int column)
    {
        var cell = Cell(column);
        if (Iso.TryParse(cell, out var date) && date.Year is >= 1900 and < 2200) return date;
        Fault(column, cell, "a date as yyyy-MM-dd, from 1900 to 2199");
        return default;
    }

    /// <summary>Any ISO 8601 date, or null where the cell is empty.</summary>
    public DateOnly? OptionalDate(int column)
    {
        var cell = Cell(column);
        if (cell.IsEmpty) return null;
        if (Iso.TryParse(cell, out var date)) return date;
        Fault(column, cell, "a date as yyyy-MM-dd, or nothing");
        return null;
    }

    /// <summary>One of <paramref name="choices"/> by its spelling in the feed.</summary>
    public T Choice<T>(int column, IReadOnlyDictionary<string, T> choices) where T : struct
    {
        var cell = Cell(column);
        foreach (var (spelling, value) in choices)
        {
            if (cell.SequenceEqual(spelling)) return value;
        }
        Fault(column, cell, "one of " + string.Join(", ", choices.Keys));
        return default;
    }

    public void Dispose() => _rows.Dispose();

    private bool IsName(int column, ReadOnlySpan<char> cell)
    {
        if (cell.Length > LongestName) Fault(column, cell, "a name of at most 200 characters");
        else if (char.IsWhiteSpace(cell[0]) || char.IsWhiteSpace(cell[^1])) Fault(column, cell, "a name without blanks around it");
        else if (cell.IndexOfAnyInRange('\0', '\u001f') >= 0) Fault(column, cell, "a name without control characters");
        else return true;
        return false;
    }

    private ReadOnlySpan<char> Cell(int column)
    {
        if (_place[column] < 0) return default;
        TryUnquote(_rows.Current[_place[column]].Span, out var cell);
        return cell;
    }

    private void CheckQuotes()
    {
        for (var c = 0; c < _place.Length; c++)
        {
            if (_place[c] >= 0 && _rows.Current[_place[c]].Span is var raw && !TryUnquote(raw, out _)) Fault(c, raw, WellQuoted);
        }
    }

    /// <summary>The cell without its quotation marks; the raw cell and false where they do not pair up.</summary>
    private bool TryUnquote(ReadOnlySpan<char> raw, out ReadOnlySpan<char> cell)
    {
        cell = raw;
        if (!raw.Contains('"')) return true;
        if (raw.Length < 2 || raw[0] != '"' || raw[^1] != '"') return false;
        if (_unquoted.Length < raw.Length) _unquoted = new char[raw.Length];
        var length = 0;
        for (var i = 1; i < raw.Length - 1; i++)
        {
            // Inside the outer pair a quotation mark counts only when it is doubled, and its twin may not be the closing one.
            if (raw[i] == '"' && (++i == raw.Length - 1 || raw[i] != '"')) return false;
            _unquoted[length++] = raw[i];
        }
        cell = _unquoted.AsSpan(0, length);
        return true;
    }

    private bool Advance()
    {
        try
        {
            if (!_rows.MoveNext()) return false;
            // Not LineNumberFrom: of a first row without a header that is one too many (Sep 0.17.1).
            (Line, _nextLine) = (_nextLine, _rows.Current.LineNumberToExcl);
            return true;
        }
        catch (NotSupportedException)
        {
            _faults.Add(_nextLine, null, "a row longer than 16 million characters", "shorter rows; a quotation mark may be left open");
            return false;
        }
    }

    private long LineOf(int column)
    {
        var line = Line;
        for (var i = 0; i < _place[column]; i++) line += _rows.Current[i].Span.Count('\n');
        return line;
    }

    private int ColumnNamed(string name)
    {
        for (var c = 0; c < _format.Columns.Count; c++)
        {
            if (_format.Columns[c].Name == name) return c;
        }
        return -1;
    }

    private string Required() => string.Join(", ", _format.Columns.Where(c => c.Required).Select(c => c.Name));
}
