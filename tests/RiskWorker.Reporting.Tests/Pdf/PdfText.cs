using System.Text;
using UglyToad.PdfPig;
using UglyToad.PdfPig.Content;

namespace RiskWorker.Reporting.Tests.Pdf;

/// <summary>A rendered file as an independent library reads it back: one line for each string that was drawn.</summary>
internal static class PdfText
{
    public static IReadOnlyList<IReadOnlyList<string>> Pages(byte[] file)
    {
        using var pdf = PdfDocument.Open(file);
        return [.. pdf.GetPages().Select(Lines)];
    }

    /// <summary>All lines of a file, the pages joined.</summary>
    public static IReadOnlyList<string> Lines(byte[] file) => [.. Pages(file).SelectMany(page => page)];

    /// <summary>All words of a file as one text, lines joined by spaces.</summary>
    public static string Flat(byte[] file) => string.Join(' ', Lines(file)).Replace('\u00A0', ' ');

    /// <summary>Fails where a letter reaches beyond the side margins or the paper.</summary>
    public static void AssertInsideMargins(byte[] file)
    {
        using var pdf = PdfDocument.Open(file);
        foreach (var page in pdf.GetPages())
        {
            foreach (var letter in page.Letters.Where(letter => !string.IsNullOrWhiteSpace(letter.Value)))
            {
                var box = letter.BoundingBox;
                Assert.True(box.Left >= 49.5 && box.Right <= 545.5, $"Page {page.Number}: '{letter.Value}' spans {box.Left:F1} to {box.Right:F1}.");
                Assert.True(box.Bottom >= 25 && box.Top <= 817, $"Page {page.Number}: '{letter.Value}' lies at {box.Bottom:F1}.");
            }
        }
    }

    private static IReadOnlyList<string> Lines(Page page)
    {
        var lines = new List<string>();
        var line = new StringBuilder();
        Letter? last = null;
        foreach (var letter in page.Letters)
        {
            if (last is not null && !Follows(last, letter))
            {
                lines.Add(line.ToString());
                line.Clear();
            }

            line.Append(letter.Value);
            last = letter;
        }

        lines.Add(line.ToString());
        return lines;
    }

    private static bool Follows(Letter last, Letter next) =>
        Math.Abs(last.EndBaseLine.X - next.StartBaseLine.X) < 0.75 && Math.Abs(last.EndBaseLine.Y - next.StartBaseLine.Y) < 0.75;
}
