using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;

namespace RiskWorker.Reporting.Pdf;

/// <summary>Headings and paragraphs as lines; a paragraph keeps two lines together at both of its ends.</summary>
internal static class TextLayout
{
    public static IEnumerable<Fragment> Heading(Typesetter typesetter, Heading heading, float width)
    {
        var (style, space, below) = heading.Level switch
        {
            1 => (TextStyle.Title, 0f, 4f),
            2 => (TextStyle.Section, 24f, 4f),
            _ => (TextStyle.Subsection, 15f, 1f),
        };
        var lines = Lines(typesetter, heading.Text, style, width, space, keepAll: true);
        if (heading.Lead is { } lead)
            lines.AddRange(Lines(typesetter, lead, TextStyle.Body with { Color = Palette.Grey }, width, 0, keepAll: true));

        lines.Add(new Fragment(below, (_, _) => { }) { KeepWithNext = true });
        return lines;
    }

    public static IEnumerable<Fragment> Paragraph(Typesetter typesetter, Paragraph paragraph, float width)
    {
        var (style, space) = paragraph.Voice switch
        {
            Voice.Lead => (TextStyle.Lead, 6f),
            Voice.Note => (TextStyle.Note, 5f),
            _ => (TextStyle.Body, 6f),
        };
        return Lines(typesetter, paragraph.Text, style, width, space, keepAll: false);
    }

    private static List<Fragment> Lines(Typesetter typesetter, RichText text, TextStyle style, float width, float space, bool keepAll)
    {
        var lines = typesetter.Break(text, style, width);
        var fragments = new List<Fragment>(lines.Count);
        for (var i = 0; i < lines.Count; i++)
        {
            var line = lines[i];
            fragments.Add(new Fragment(style.Leading, (canvas, at) => typesetter.Draw(canvas, line, style, at.X, at.Y))
            {
                SpaceBefore = i == 0 ? space : 0,
                KeepWithNext = keepAll || (i < lines.Count - 1 && (i == 0 || i == lines.Count - 2)),
            });
        }

        return fragments;
    }
}
