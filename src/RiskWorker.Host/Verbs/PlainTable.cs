using RiskWorker.Host.Options;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>A table without lines. Cells are text, never markup, so a book may be called '[red]'.</summary>
public sealed class PlainTable
{
    private readonly Table _table = new() { Border = TableBorder.None };

    /// <summary>Adds a column of words; its cells may wrap.</summary>
    public PlainTable Words(string head) => Column(head, Justify.Left, wraps: true);

    /// <summary>Adds a column of short words that stay on one line.</summary>
    public PlainTable Labels(string head) => Column(head, Justify.Left, wraps: false);

    /// <summary>Adds a column of figures, aligned to the right.</summary>
    public PlainTable Numbers(string head) => Column(head, Justify.Right, wraps: false);

    /// <summary>Adds a row.</summary>
    public void Row(params (string Text, Style? Style)[] cells) => _table.AddRow(cells.Select(c => new Text(Printable.Of(c.Text), c.Style ?? Style.Plain)));

    /// <summary>Adds a row.</summary>
    public void Row(params string[] cells) => Row([.. cells.Select(c => (c, (Style?)null))]);

    /// <summary>Prints the table and an empty line.</summary>
    public void Write(IAnsiConsole console)
    {
        // Many columns leave less room between them, or names would break inside words on a terminal of 80 columns.
        foreach (var column in _table.Columns) column.Padding = new Padding(0, 0, _table.Columns.Count > 6 ? 1 : 2, 0);
        console.Write(_table);
        console.WriteLine();
    }

    private PlainTable Column(string head, Justify justify, bool wraps)
    {
        _table.AddColumn(new TableColumn(new Text(head, new Style(decoration: Decoration.Bold))) { Alignment = justify, NoWrap = !wraps });
        return this;
    }
}
