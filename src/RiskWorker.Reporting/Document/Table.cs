namespace RiskWorker.Reporting.Document;

/// <summary>A table; it breaks between rows, keeps groups together where it can and repeats its head on every page.</summary>
/// <param name="Columns">The columns, left to right.</param>
/// <param name="Groups">The rows; a table without rows is replaced by <paramref name="WhenEmpty"/>.</param>
/// <param name="WhenEmpty">The sentence that stands in place of an empty table.</param>
public sealed record Table(IReadOnlyList<Column> Columns, IReadOnlyList<RowGroup> Groups, string WhenEmpty) : Block;

/// <summary>Where a column's text stands.</summary>
public enum Alignment
{
    /// <summary>Words.</summary>
    Left,

    /// <summary>Figures: the digits of equal decimals stand below each other.</summary>
    Right,
}

/// <summary>A column of a table.</summary>
/// <param name="Head">Its name.</param>
/// <param name="Weight">Its share of the width before long words claim theirs.</param>
/// <param name="Alignment">Where its text and its head stand.</param>
/// <param name="Unit">The unit of its figures, below its name; empty for none.</param>
public sealed record Column(string Head, double Weight, Alignment Alignment = Alignment.Left, string Unit = "");

/// <summary>Rows that are kept on one page where they fit.</summary>
/// <param name="Rows">The rows.</param>
/// <param name="Title">A line above them; null for none.</param>
public sealed record RowGroup(IReadOnlyList<Row> Rows, string? Title = null);

/// <summary>How a row stands out.</summary>
public enum Emphasis
{
    /// <summary>Like its neighbours.</summary>
    None,

    /// <summary>In the heavier weight.</summary>
    Strong,

    /// <summary>In grey.</summary>
    Muted,

    /// <summary>A sum: the heavier weight below a rule.</summary>
    Total,
}

/// <summary>A row of a table.</summary>
/// <param name="Cells">One cell a column.</param>
/// <param name="Emphasis">How it stands out.</param>
public sealed record Row(IReadOnlyList<Cell> Cells, Emphasis Emphasis = Emphasis.None);

/// <summary>A cell of a table.</summary>
public abstract record Cell
{
    /// <summary>A cell of plain text.</summary>
    public static implicit operator Cell(string text) => new TextCell(text);
}

/// <summary>Text that wraps in its column.</summary>
/// <param name="Text">The words or the figure.</param>
/// <param name="Below">What stands below it, small and grey: an interval, a date; empty for none.</param>
/// <param name="Level">How many steps it is indented: the depth in a tree.</param>
public sealed record TextCell(RichText Text, string Below = "", int Level = 0) : Cell;

/// <summary>A status: a drawn shape and its word.</summary>
/// <param name="Mark">The shape.</param>
/// <param name="Word">The word.</param>
/// <param name="Below">What stands below it, small and grey; empty for none.</param>
public sealed record StatusCell(StatusMark Mark, string Word, string Below = "") : Cell;

/// <summary>A bar of utilisation with marks at 100% and at the warning level, and its figure beside it.</summary>
/// <param name="Used">The part used; 1 is the limit. Negative and not-a-number draw no bar.</param>
/// <param name="Low">The lower end of its interval; null for none.</param>
/// <param name="High">The upper end of its interval; null for none.</param>
/// <param name="WarnAt">The warning level as a part of the limit.</param>
/// <param name="Text">The figure as text.</param>
/// <param name="Mark">The status whose colour the bar takes.</param>
public sealed record BarCell(double Used, double? Low, double? High, double WarnAt, string Text, StatusMark Mark) : Cell;
