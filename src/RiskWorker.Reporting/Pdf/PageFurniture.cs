using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>What stands on every page: title, as-of date and run at the head; a remark and the page number at the foot.</summary>
internal static class PageFurniture
{
    public static void Draw(SKCanvas canvas, Typesetter typesetter, ReportDocument document, int page, int pages)
    {
        var strong = TextStyle.Furniture with { Strong = true, Color = Palette.Accent };
        Pair(canvas, typesetter, PageGeometry.Head, document.Title, strong, document.Running);
        Pair(canvas, typesetter, PageGeometry.Foot, document.Foot, TextStyle.Furniture, $"page {Numerals.Count(page)} of {Numerals.Count(pages)}");
        using var rule = new SKPaint { Color = Palette.Rule, IsStroke = true, StrokeWidth = 0.5f };
        var right = PageGeometry.Width - PageGeometry.Side;
        canvas.DrawLine(PageGeometry.Side, PageGeometry.Head + 13, right, PageGeometry.Head + 13, rule);
        canvas.DrawLine(PageGeometry.Side, PageGeometry.Foot - 4, right, PageGeometry.Foot - 4, rule);
    }

    // The right text is never cut, for it identifies the page; the left one gives way.
    private static void Pair(SKCanvas canvas, Typesetter typesetter, float y, string left, TextStyle leftStyle, string right)
    {
        const float gap = 16;
        var end = typesetter.Cut(right, TextStyle.Furniture, PageGeometry.BodyWidth);
        var endWidth = typesetter.Width(end, TextStyle.Furniture);
        var room = PageGeometry.BodyWidth - endWidth - gap;
        var start = room > 0 ? typesetter.Cut(left, leftStyle, room) : "";
        typesetter.Draw(canvas, Line(start, leftStyle.Strong), leftStyle, PageGeometry.Side, y);
        typesetter.Draw(canvas, Line(end, strong: false), TextStyle.Furniture, PageGeometry.Width - PageGeometry.Side - endWidth, y);
    }

    private static TextLine Line(string text, bool strong) => new([new TextSpan(text, strong, 0)], 0);
}
