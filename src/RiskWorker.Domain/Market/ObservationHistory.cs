namespace RiskWorker.Domain.Market;

/// <summary>
/// All observations up to a date as a dense table: ascending dates × factors in ordinal order of their names, NaN where nothing was observed.
/// Later dates of a longer table can be cut off without copying (<see cref="UpTo"/>), so a span of as-of dates shares one table.
/// </summary>
public sealed class ObservationHistory
{
    private readonly DateOnly[] _dates;
    private readonly double[][] _columns;

    private ObservationHistory(IReadOnlyList<string> factors, DateOnly[] dates, double[][] columns, int count)
    {
        Factors = factors;
        _dates = dates;
        _columns = columns;
        Count = count;
    }

    /// <summary>Names of the columns, in ordinal order.</summary>
    public IReadOnlyList<string> Factors { get; }

    /// <summary>Number of dates.</summary>
    public int Count { get; }

    /// <summary>The dates, ascending.</summary>
    public ReadOnlySpan<DateOnly> Dates => _dates.AsSpan(0, Count);

    /// <summary>The values of the factor in column <paramref name="factor"/>, one a date, NaN where missing.</summary>
    public ReadOnlySpan<double> Column(int factor) => _columns[factor].AsSpan(0, Count);

    /// <summary>Index of <paramref name="date"/>, or the complement of where it would stand.</summary>
    public int IndexOf(DateOnly date) => Array.BinarySearch(_dates, 0, Count, date);

    /// <summary>The column of <paramref name="factor"/>, or a negative number.</summary>
    public int ColumnOf(string factor)
    {
        var (low, high) = (0, Factors.Count - 1);
        while (low <= high)
        {
            var middle = (low + high) >>> 1;
            var order = string.CompareOrdinal(Factors[middle], factor);
            if (order == 0) return middle;
            if (order < 0) low = middle + 1;
            else high = middle - 1;
        }
        return ~low;
    }

    /// <summary>The same table without dates after <paramref name="date"/>.</summary>
    public ObservationHistory UpTo(DateOnly date)
    {
        var index = IndexOf(date);
        return new(Factors, _dates, _columns, index >= 0 ? index + 1 : ~index);
    }

    /// <summary>Builds the table for <paramref name="factors"/>; observations of other factors are left out, and of two for one date the later in the sequence stands.</summary>
    public static ObservationHistory From(IEnumerable<string> factors, IReadOnlyList<Observation> observations)
    {
        var names = factors.Order(StringComparer.Ordinal).ToArray();
        var column = new Dictionary<string, int>(names.Length, StringComparer.Ordinal);
        for (var j = 0; j < names.Length; j++) column[names[j]] = j;
        var days = new HashSet<DateOnly>();
        foreach (var o in observations) days.Add(o.Date);
        var dates = days.ToArray();
        Array.Sort(dates);
        var row = new Dictionary<DateOnly, int>(dates.Length);
        for (var i = 0; i < dates.Length; i++) row[dates[i]] = i;
        var columns = new double[names.Length][];
        for (var j = 0; j < columns.Length; j++)
        {
            columns[j] = new double[dates.Length];
            Array.Fill(columns[j], double.NaN);
        }
        foreach (var o in observations)
        {
            if (column.TryGetValue(o.Factor, out var j)) columns[j][row[o.Date]] = o.Value;
        }
        return new(names, dates, columns, dates.Length);
    }
}
