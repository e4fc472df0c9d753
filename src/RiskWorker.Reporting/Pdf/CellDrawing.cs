using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>A cell that has been broken to its column's width.</summary>
internal abstract class CellDrawing(Typesetter typesetter, TextStyle style, float width)
{
    private const float Indent = 10;
    private const int DeepestIndent = 8; // deeper levels stand in line with the eighth: a tree must leave room for its figures
    private const float LongestWord = 90;
    private const float ShapeRoom = 12;

    protected Typesetter Typesetter { get; } = typesetter;

    protected TextStyle Style { get; } = style;

    protected float Width { get; } = width;

    /// <summary>How many lines high it is, at least 1.</summary>
    public abstract int Lines { get; }

    /// <summary>The width below which a word of it would have to be broken; long words other than figures may be.</summary>
    public static float Need(Typesetter typesetter, Cell cell, Emphasis emphasis) => cell switch
    {
        TextCell text => IndentOf(text) + Math.Max(
            Capped(text.Text, typesetter.WidestWord(text.Text, StyleOf(emphasis))),
            Capped(text.Below, typesetter.WidestWord(text.Below, TextStyle.Unit))),
        StatusCell status => ShapeRoom + Math.Max(
            typesetter.WidestWord(status.Word, StyleOf(emphasis)),
            typesetter.WidestWord(status.Below, TextStyle.Unit)),
        BarCell bar => BarDrawing.SmallestBar + BarDrawing.TextWidth(typesetter, bar, StyleOf(emphasis)),
        _ => throw new ArgumentException($"A cell of type {cell.GetType().Name} has no drawing."),
    };

    public static CellDrawing Of(Typesetter typesetter, Cell cell, Emphasis emphasis, float width, double barScale) => cell switch
    {
        TextCell text => new Words(typesetter, (text.Text, text.Below), StyleOf(emphasis), width, IndentOf(text)),
        StatusCell status => new Words(typesetter, (status.Word, status.Below), StyleOf(emphasis), width, ShapeRoom, status.Mark),
        BarCell bar => new BarDrawing(typesetter, bar, StyleOf(emphasis), width, barScale),
        _ => throw new ArgumentException($"A cell of type {cell.GetType().Name} has no drawing."),
    };

    /// <summary>Draws the lines from <paramref name="first"/> on, at most <paramref name="count"/> of them.</summary>
    public abstract void Draw(SKCanvas canvas, SKPoint at, Alignment alignment, int first, int count);

    private static float IndentOf(TextCell cell) => Math.Min(cell.Level, DeepestIndent) * Indent;

    private static float Capped(RichText text, float widest) =>
        text.ToString().AsSpan().ContainsAnyInRange('A', 'z') ? Math.Min(widest, LongestWord) : widest;

    private static TextStyle StyleOf(Emphasis emphasis) => emphasis switch
    {
        Emphasis.Strong or Emphasis.Total => TextStyle.Cell with { Strong = true },
        Emphasis.Muted => TextStyle.Cell with { Color = Palette.Grey },
        _ => TextStyle.Cell,
    };

    private sealed class Words(
        Typesetter typesetter, (RichText Text, string Below) words, TextStyle style, float width, float indent, StatusMark mark = StatusMark.None)
        : CellDrawing(typesetter, style, width)
    {
        private readonly IReadOnlyList<TextLine> lines = typesetter.Break(words.Text, style, Math.Max(width - indent, 1));
        private readonly IReadOnlyList<TextLine> below = typesetter.Break(words.Below, Small, Math.Max(width - indent, 1));

        // Small letters on the line height of the row, so that all cells of a row break at the same lines.
        private static TextStyle Small => TextStyle.Unit with { Leading = TextStyle.Cell.Leading };

        public override int Lines => Math.Max(lines.Count + below.Count, 1);

        public override void Draw(SKCanvas canvas, SKPoint at, Alignment alignment, int first, int count)
        {
            if (mark != StatusMark.None && first == 0)
                StatusShape.Draw(canvas, mark, at.X + 4, at.Y + (Style.Leading / 2), 7);
            var corner = new SKPoint(at.X + indent, at.Y);
            var part = lines.Skip(first).Take(count).ToList();
            Typesetter.Draw(canvas, part, Style, corner, Width - indent, alignment);
            var rest = below.Skip(Math.Max(first - lines.Count, 0)).Take(count - part.Count).ToList();
            corner.Offset(0, part.Count * Style.Leading);
            Typesetter.Draw(canvas, rest, Small, corner, Width - indent, alignment);
        }
    }
}
