using RiskWorker.Host.Options;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>A table without lines. Cells are text, never markup, so a book may be called '[red]'.</summary>
public sealed class PlainTable
{
    private readonly Table _table = new() { Border = TableBorder.None };
    private readonly List<int> _widths = [];

    /// <summary>Adds a column of words; its cells may wrap.</summary>
    public PlainTable Words(string head) => Column(head, Justify.Left, wraps: true);

    /// <summary>Adds a column of short words that stay on one line.</summary>
    public PlainTable Labels(string head) => Column(head, Justify.Left, wraps: false);

    /// <summary>Adds a column of figures, aligned to the right.</summary>
    public PlainTable Numbers(string head) => Column(head, Justify.Right, wraps: false);

    /// <summary>Adds a row.</summary>
    public void Row(params (string Text, Style? Style)[] cells)
    {
        for (var i = 0; i < cells.Length; i++) _widths[i] = Math.Max(_widths[i], cells[i].Text.Length);
        _table.AddRow(cells.Select(c => new Text(Printable.Of(c.Text), c.Style ?? Style.Plain)));
    }

    /// <summary>Adds a row.</summary>
    public void Row(params string[] cells) => Row([.. cells.Select(c => (c, (Style?)null))]);

    /// <summary>Prints the table and an empty line.</summary>
    public void Write(IAnsiConsole console)
    {
        // Less room between many columns, where names would otherwise break inside words; a column of sentences wraps anyway.
        var room = _widths.Count > 6 && _widths.Sum(w => w + 2) > console.Profile.Width ? 1 : 2;
        foreach (var column in _table.Columns) column.Padding = new Padding(0, 0, room, 0);
        console.Write(_table);
        console.WriteLine();
    }

    private PlainTable Column(string head, Justify justify, bool wraps)
    {
        _widths.Add(head.Length);
        _table.AddColumn(new TableColumn(new Text(head, new Style(decoration: Decoration.Bold))) { Alignment = justify, NoWrap = !wraps });
        return this;
    }
}
