using RiskWorker.Reporting.Document;
using SkiaSharp;

namespace RiskWorker.Reporting.Drawing;

/// <summary>The shape of each status, as paths: told apart without colour.</summary>
internal static class StatusShape
{
    /// <summary>Draws the shape inside a square of the given side around a centre.</summary>
    public static void Draw(SKCanvas canvas, StatusMark mark, float x, float y, float side)
    {
        var half = side / 2;
        using var fill = new SKPaint { IsAntialias = true, Color = Palette.Of(mark) };
        using var line = new SKPaint { IsAntialias = true, Color = Palette.Of(mark), IsStroke = true, StrokeWidth = side * 0.16f };
        switch (mark)
        {
            case StatusMark.Good:
                canvas.DrawCircle(x, y, half * 0.78f, line);
                break;
            case StatusMark.Warning:
                Polygon(canvas, fill, (x, y - half), (x + half, y + (half * 0.8f)), (x - half, y + (half * 0.8f)));
                break;
            case StatusMark.Undecided:
                var inner = half * 0.92f;
                Polygon(canvas, line, (x, y - inner), (x + inner, y), (x, y + inner), (x - inner, y));
                Polygon(canvas, fill, (x, y - inner), (x, y + inner), (x - inner, y));
                break;
            case StatusMark.Bad:
                canvas.DrawRect(x - (half * 0.9f), y - (half * 0.9f), side * 0.9f, side * 0.9f, fill);
                Cross(canvas, x, y, half * 0.45f);
                break;
        }
    }

    private static void Cross(SKCanvas canvas, float x, float y, float arm)
    {
        using var paper = new SKPaint { IsAntialias = true, Color = Palette.Paper, IsStroke = true, StrokeWidth = arm * 0.55f };
        canvas.DrawLine(x - arm, y - arm, x + arm, y + arm, paper);
        canvas.DrawLine(x - arm, y + arm, x + arm, y - arm, paper);
    }

    private static void Polygon(SKCanvas canvas, SKPaint paint, params ReadOnlySpan<(float X, float Y)> corners)
    {
        using var path = new SKPathBuilder();
        path.MoveTo(corners[0].X, corners[0].Y);
        foreach (var (x, y) in corners[1..])
            path.LineTo(x, y);

        path.Close();
        using var shape = path.Detach();
        canvas.DrawPath(shape, paint);
    }
}
