using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>A table as one fragment a row: hairlines between rows, no boxes, the head repeated on every page.</summary>
internal sealed class TableLayout
{
    private const float Gap = 9;
    private const float Pad = 2.75f;

    // A group larger than this breaks like loose rows: keeping it whole would leave half a page empty.
    private const float LargestGroup = PageGeometry.BodyHeight * 0.4f;

    // A row of more lines goes on in a second row, so that no row is taller than a page.
    private const int LinesPerRow = 40;

    // A longer word of a head is broken: a model may be called anything.
    private const float LongestHead = 60;

    private readonly Typesetter typesetter;
    private readonly Table table;
    private readonly float width;
    private readonly float[] widths;
    private readonly double barScale;

    public TableLayout(Typesetter typesetter, Table table, float width)
    {
        (this.typesetter, this.table, this.width) = (typesetter, table, width);
        barScale = BarDrawing.Scale(Rows.SelectMany(row => row.Cells).OfType<BarCell>());
        widths = Widths();
    }

    private IEnumerable<Row> Rows => table.Groups.SelectMany(group => group.Rows);

    public IEnumerable<Fragment> Layout()
    {
        if (!Rows.Any())
            return TextLayout.Paragraph(typesetter, new Paragraph(table.WhenEmpty), width);

        var head = Head();
        return table.Groups.Where(group => group.Rows.Count > 0).SelectMany(group => Group(group, head)).Prepend(head);
    }

    private float[] Widths()
    {
        var needs = table.Columns.Select((column, i) => Rows
            .Select(row => CellDrawing.Need(typesetter, row.Cells[i], row.Emphasis))
            .Append(Math.Min(typesetter.WidestWord(column.Head, TextStyle.Head), LongestHead))
            .Append(typesetter.WidestWord(column.Unit, TextStyle.Unit))
            .Max());
        var free = width - (Gap * (table.Columns.Count - 1));
        return ColumnWidths.Share([.. table.Columns.Select(column => column.Weight)], [.. needs], free);
    }

    private Fragment Head()
    {
        var heads = table.Columns.Select((column, i) => typesetter.Break(column.Head, TextStyle.Head, widths[i])).ToList();
        var units = table.Columns.Select((column, i) => typesetter.Break(column.Unit, TextStyle.Unit, widths[i])).ToList();
        float Extent(int i) => (heads[i].Count * TextStyle.Head.Leading) + (units[i].Count * TextStyle.Unit.Leading);
        var tallest = Enumerable.Range(0, heads.Count).Max(Extent);
        return new Fragment(tallest + 4, Draw) { SpaceBefore = 8, KeepWithNext = true };

        void Draw(SKCanvas canvas, SKPoint at)
        {
            var x = at.X;
            for (var i = 0; i < heads.Count; i++)
            {
                var y = at.Y + tallest - Extent(i);
                var alignment = table.Columns[i].Alignment;
                typesetter.Draw(canvas, heads[i], TextStyle.Head, new(x, y), widths[i], alignment);
                y += heads[i].Count * TextStyle.Head.Leading;
                typesetter.Draw(canvas, units[i], TextStyle.Unit, new(x, y), widths[i], alignment);
                x += widths[i] + Gap;
            }

            Rule(canvas, at, tallest + 3, Palette.Ink, 0.75f);
        }
    }

    private IEnumerable<Fragment> Group(RowGroup group, Fragment head)
    {
        var fragments = group.Rows.SelectMany(Pieces).ToList();
        var repeat = head;
        if (group.Title is { } title)
        {
            var line = GroupTitle(title);
            repeat = Stack(head, line);
            fragments.Insert(0, line);
        }

        // A loose table keeps its first two rows with its head and its last two with each other.
        var whole = fragments.Sum(one => one.Extent) <= LargestGroup;
        return fragments.Select((one, i) => one with
        {
            Repeat = i == 0 ? head : repeat,
            KeepWithNext = i < fragments.Count - 1 && (whole || i == 0 || i == fragments.Count - 2),
        });
    }

    // The title may hold the unit of the figures, so a page that goes on with the group repeats it too.
    private static Fragment Stack(Fragment head, Fragment title) => new(head.Height + title.Height, (canvas, at) =>
    {
        head.Draw(canvas, at);
        title.Draw(canvas, new SKPoint(at.X, at.Y + head.Height));
    });

    private Fragment GroupTitle(string title)
    {
        var style = TextStyle.Cell with { Strong = true };
        var lines = typesetter.Break(title, style, width);
        return new Fragment((lines.Count * style.Leading) + (2 * Pad), (canvas, at) =>
            typesetter.Draw(canvas, lines, style, new(at.X, at.Y + Pad), width, Alignment.Left))
        {
            SpaceBefore = 7,
        };
    }

    private IEnumerable<Fragment> Pieces(Row row)
    {
        var cells = row.Cells.Select((cell, i) => CellDrawing.Of(typesetter, cell, row.Emphasis, widths[i], barScale)).ToList();
        var lines = cells.Max(cell => cell.Lines);
        for (var first = 0; first < lines; first += LinesPerRow)
        {
            var from = first;
            var count = Math.Min(LinesPerRow, lines - from);
            yield return new Fragment((count * TextStyle.Cell.Leading) + (2 * Pad), Draw);

            void Draw(SKCanvas canvas, SKPoint at)
            {
                if (row.Emphasis == Emphasis.Total && from == 0)
                    Rule(canvas, at, 0, Palette.Ink, 0.5f);
                var x = at.X;
                for (var i = 0; i < cells.Count; i++)
                {
                    cells[i].Draw(canvas, new SKPoint(x, at.Y + Pad), table.Columns[i].Alignment, from, count);
                    x += widths[i] + Gap;
                }

                if (from + count >= lines)
                    Rule(canvas, at, (count * TextStyle.Cell.Leading) + (2 * Pad), Palette.Rule, 0.4f);
            }
        }
    }

    private void Rule(SKCanvas canvas, SKPoint at, float y, SKColor color, float thickness)
    {
        using var paint = new SKPaint { Color = color, IsStroke = true, StrokeWidth = thickness };
        canvas.DrawLine(at.X, at.Y + y, at.X + width, at.Y + y, paint);
    }
}
