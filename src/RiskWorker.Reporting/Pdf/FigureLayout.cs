using RiskWorker.Reporting.Charts;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>A chart between its title and its caption, on one page.</summary>
internal static class FigureLayout
{
    public static IEnumerable<Fragment> Layout(Typesetter typesetter, Figure figure, float width)
    {
        var chart = ChartPainter.Paint(figure.Chart, typesetter, new SKSize(width, figure.Height));
        var fragments = TextLayout.Heading(typesetter, new Heading(figure.Title, 3), width).ToList();
        fragments.Add(new Fragment(figure.Height, chart));
        fragments.AddRange(TextLayout.Paragraph(typesetter, new Paragraph(figure.Caption, Voice.Note), width));
        return fragments.Select((one, i) => one with { KeepWithNext = i < fragments.Count - 1 });
    }
}
