using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>A callout as lines, each with its part of the rule at the left, so that it may break like any text.</summary>
internal static class CalloutLayout
{
    private const float Inset = 22;

    public static IEnumerable<Fragment> Layout(Typesetter typesetter, Callout callout, float width)
    {
        var lines = new List<(TextLine Line, TextStyle Style, float Gap)>();
        Add(callout.Head, TextStyle.Lead with { Strong = true }, 0);
        foreach (var paragraph in callout.Body)
            Add(paragraph, TextStyle.Body, 3);

        return lines.Select((_, i) => Piece(i)).Append(new Fragment(0, (_, _) => { }) { SpaceBefore = 5 });

        void Add(RichText text, TextStyle style, float gap)
        {
            foreach (var line in typesetter.Break(text, style, width - Inset))
            {
                lines.Add((line, style, gap));
                gap = 0;
            }
        }

        Fragment Piece(int i)
        {
            var (line, style, gap) = lines[i];
            return new Fragment(gap + style.Leading, Draw)
            {
                SpaceBefore = i == 0 ? 10 : 0,
                KeepWithNext = i < lines.Count - 1 && lines.Count < 30,
            };

            void Draw(SKCanvas canvas, SKPoint at)
            {
                using var rule = new SKPaint { Color = Palette.Of(callout.Mark) };
                canvas.DrawRect(at.X, at.Y, 2, gap + style.Leading + (i < lines.Count - 1 ? 0.5f : 0), rule);
                if (i == 0)
                    StatusShape.Draw(canvas, callout.Mark, at.X + 12.5f, at.Y + (style.Leading / 2), 9);
                typesetter.Draw(canvas, line, style, at.X + Inset, at.Y + gap);
            }
        }
    }
}
