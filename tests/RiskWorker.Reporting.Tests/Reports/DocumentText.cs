using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Tests.Reports;

/// <summary>The words of a document before it is laid out: what a test of words needs, without drawing a page.</summary>
internal static class DocumentText
{
    /// <summary>All words of a document, in reading order, joined by spaces; those that a chart draws are left out.</summary>
    public static string Of(ReportDocument document) => Joined(document.Sections.SelectMany(section => section.Blocks).SelectMany(Words));

    /// <summary>All words of a section.</summary>
    public static string Of(Section section) => Joined(section.Blocks.SelectMany(Words));

    private static string Joined(IEnumerable<string> words) => string.Join(' ', words.Where(word => word.Length > 0)).Replace('\u00A0', ' ');

    private static IEnumerable<string> Words(Block block) => block switch
    {
        Heading heading => [heading.Text, heading.Lead?.ToString() ?? ""],
        Paragraph paragraph => [paragraph.Text.ToString()],
        Callout callout => [callout.Head, .. callout.Body.Select(line => line.ToString())],
        KeyFigures figures => figures.Figures.SelectMany(figure => (string[])[figure.Label, figure.Value, figure.Unit, figure.Detail.ToString()]),
        Facts facts => facts.Items.SelectMany(fact => (string[])[fact.Name, fact.Value.ToString()]),
        Figure figure => [figure.Title, figure.Caption],
        Columns columns => columns.Left.Concat(columns.Right).SelectMany(Words),
        Table table => table.Columns.SelectMany(column => (string[])[column.Head, column.Unit])
            .Concat(table.Groups.SelectMany(group => group.Rows.SelectMany(row => row.Cells).SelectMany(Words).Prepend(group.Title ?? ""))),
        _ => [],
    };

    private static string[] Words(Cell cell) => cell switch
    {
        TextCell text => [text.Text.ToString(), text.Below],
        StatusCell status => [status.Word, status.Below],
        BarCell bar => [bar.Text],
        _ => [],
    };
}
