using RiskWorker.Reporting.Document;
using SkiaSharp;

namespace RiskWorker.Reporting.Drawing;

/// <summary>Measures, breaks and draws text in the embedded typeface; one serves one rendering, on one thread.</summary>
internal sealed class Typesetter : IDisposable
{
    private readonly Dictionary<(bool Strong, float Size), SKFont> fonts = [];
    private readonly SKPaint paint = new() { IsAntialias = true };

    /// <summary>The characters met so far that the typeface lacks.</summary>
    public MissingGlyphs Missing { get; } = new();

    /// <summary>The width of clean text.</summary>
    public float Width(string text, TextStyle style) => Font(style.Strong, style.Size).MeasureText(text);

    /// <summary>Text in which every character can be drawn.</summary>
    public string Clean(string text) => Missing.Replace(text, Font(strong: false, 10));

    /// <inheritdoc cref="Clean(string)"/>
    public RichText Clean(RichText text) =>
        RichText.Of([.. text.Runs.Select(run => run with { Text = Missing.Replace(run.Text, Font(run.Strong, 10)) })]);

    /// <summary>Text as lines no wider than <paramref name="width"/>; no characters give no lines.</summary>
    public IReadOnlyList<TextLine> Break(RichText text, TextStyle style, float width) =>
        new LineBreaker(this, style, width).Break(Clean(text));

    /// <summary>The width of the widest word.</summary>
    public float WidestWord(RichText text, TextStyle style) =>
        LineBreaker.Words(Clean(text))
            .Select(word => word.Sum(run => Width(run.Text, style with { Strong = style.Strong || run.Strong })))
            .DefaultIfEmpty(0)
            .Max();

    /// <summary>Clean text cut to a width, with an ellipsis where something was left out.</summary>
    public string Cut(string text, TextStyle style, float width)
    {
        var clean = Clean(text);
        if (Width(clean, style) <= width)
            return clean;

        var keep = clean.Length;
        while (keep > 0 && (char.IsHighSurrogate(clean[keep - 1]) || Width(clean[..keep].TrimEnd() + "…", style) > width))
            keep--;

        return clean[..keep].TrimEnd() + "…";
    }

    /// <summary>Draws a line whose box has its top left corner at the point given.</summary>
    public void Draw(SKCanvas canvas, TextLine line, TextStyle style, float x, float top)
    {
        paint.Color = style.Color;
        foreach (var span in line.Spans)
            canvas.DrawText(span.Text, x + span.X, top + style.Ascent, SKTextAlign.Left, Font(span.Strong, style.Size), paint);
    }

    /// <summary>Draws lines below each other, in a box of a width, to its left or its right edge.</summary>
    public void Draw(SKCanvas canvas, IReadOnlyList<TextLine> lines, TextStyle style, SKPoint corner, float width, Alignment alignment)
    {
        for (var i = 0; i < lines.Count; i++)
        {
            var shift = alignment == Alignment.Right ? width - lines[i].Width : 0;
            Draw(canvas, lines[i], style, corner.X + shift, corner.Y + (i * style.Leading));
        }
    }

    public void Dispose()
    {
        foreach (var font in fonts.Values)
            font.Dispose();
        paint.Dispose();
    }

    private SKFont Font(bool strong, float size)
    {
        if (fonts.TryGetValue((strong, size), out var known))
            return known;

        var font = new SKFont(Faces.Of(strong), size) { Subpixel = true, LinearMetrics = true, Hinting = SKFontHinting.None };
        fonts.Add((strong, size), font);
        return font;
    }
}
