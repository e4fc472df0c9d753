using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>A utilisation bar on the scale of its table: a whisker for its interval, a line at 100%, a tick at the warning level.</summary>
internal sealed class BarDrawing(Typesetter typesetter, BarCell bar, TextStyle style, float width, double scale)
    : CellDrawing(typesetter, style, width)
{
    public const float SmallestBar = 56;
    private const float TextGap = 7;
    private const float Thickness = 4.5f;
    private const double LargestScale = 2;

    public override int Lines => 1;

    /// <summary>The utilisation at the right end of a column's bars: what the largest needs, between 1.25 and 2.</summary>
    public static double Scale(IEnumerable<BarCell> bars) =>
        Math.Clamp(bars.Select(bar => Math.Max(Finite(bar.Used), Finite(bar.High ?? 0))).DefaultIfEmpty(0).Max() * 1.02, 1.25, LargestScale);

    // Figures of a column end below each other: all take the room of 'not known' or more.
    public static float TextWidth(Typesetter typesetter, BarCell bar, TextStyle style) =>
        TextGap + Math.Max(typesetter.Width(typesetter.Clean(bar.Text), style), typesetter.Width("1,000.0%", style));

    public override void Draw(SKCanvas canvas, SKPoint at, Alignment alignment, int first, int count)
    {
        if (first > 0)
            return;

        var text = TextWidth(Typesetter, bar, Style);
        var track = Math.Max(Width - text, 1);
        var y = at.Y + (Style.Leading / 2);
        DrawBar(canvas, at.X, y, track);
        Mark(canvas, X(bar.WarnAt), y, 2.75f, Palette.Grey, 0.6f);
        Mark(canvas, X(1), y, 4.5f, Palette.Ink, 0.9f);
        var line = new TextLine([new TextSpan(Typesetter.Clean(bar.Text), Style.Strong, 0)], text - TextGap);
        var used = Typesetter.Width(line.Spans[0].Text, Style);
        Typesetter.Draw(canvas, line, Style, at.X + Width - used, at.Y);

        float X(double part) => at.X + (float)(Math.Clamp(part / scale, 0, 1) * track);
    }

    private static double Finite(double value) => double.IsFinite(value) ? value : 0;

    private void DrawBar(SKCanvas canvas, float x, float y, float track)
    {
        using var paint = new SKPaint { IsAntialias = true, Color = Palette.Track };
        canvas.DrawRect(x, y - (Thickness / 2), track, Thickness, paint);
        if (!double.IsFinite(bar.Used) || bar.Used <= 0)
            return;

        paint.Color = Palette.Of(bar.Mark);
        canvas.DrawRect(x, y - (Thickness / 2), (float)(Math.Min(bar.Used / scale, 1) * track), Thickness, paint);
        if (bar.Used > scale)
            Torn(canvas, x + track, y);
        if (bar.Low is { } low && bar.High is { } high && low < scale)
            Whisker(canvas, x + (float)(Math.Max(low, 0) / scale * track), x + (float)(Math.Min(high / scale, 1) * track), y);
    }

    private static void Whisker(SKCanvas canvas, float low, float high, float y)
    {
        using var line = new SKPaint { IsAntialias = true, Color = Palette.Ink, IsStroke = true, StrokeWidth = 0.7f };
        canvas.DrawLine(low, y, high, y, line);
        canvas.DrawLine(low, y - 1.4f, low, y + 1.4f, line);
        canvas.DrawLine(high, y - 1.4f, high, y + 1.4f, line);
    }

    // A bar that goes on beyond the scale is torn at its end.
    private static void Torn(SKCanvas canvas, float x, float y)
    {
        using var paper = new SKPaint { IsAntialias = true, Color = Palette.Paper, IsStroke = true, StrokeWidth = 1.2f };
        canvas.DrawLine(x - 6, y + Thickness, x - 4, y - Thickness, paper);
        canvas.DrawLine(x - 3.5f, y + Thickness, x - 1.5f, y - Thickness, paper);
    }

    private static void Mark(SKCanvas canvas, float x, float y, float half, SKColor color, float thickness)
    {
        using var paint = new SKPaint { IsAntialias = true, Color = color, IsStroke = true, StrokeWidth = thickness };
        canvas.DrawLine(x, y - half, x, y + half, paint);
    }
}
