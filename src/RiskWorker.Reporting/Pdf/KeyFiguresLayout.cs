using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>Large figures side by side, four to a row, each below a hairline.</summary>
internal static class KeyFiguresLayout
{
    private const int PerRow = 4;
    private const float Gutter = 18;
    private const float Smallest = 9;

    public static IEnumerable<Fragment> Layout(Typesetter typesetter, KeyFigures block, float width)
    {
        var across = Math.Clamp(block.Figures.Count, 1, PerRow);
        var cell = (width - ((across - 1) * Gutter)) / across;
        foreach (var row in block.Figures.Chunk(PerRow))
        {
            var boxes = row.Select(figure => new Box(typesetter, figure, cell)).ToList();
            yield return new Fragment(boxes.Max(box => box.Height), Draw) { SpaceBefore = 12 };

            void Draw(SKCanvas canvas, SKPoint at)
            {
                var label = boxes.Max(box => box.LabelHeight);
                for (var i = 0; i < boxes.Count; i++)
                    boxes[i].Draw(canvas, new SKPoint(at.X + (i * (cell + Gutter)), at.Y), label);
            }
        }
    }

    private sealed class Box
    {
        private const float Top = 6;
        private const float BelowValue = 2;
        private readonly Typesetter typesetter;
        private readonly KeyFigure figure;
        private readonly float width;
        private readonly TextStyle valueStyle;
        private readonly IReadOnlyList<TextLine> label;
        private readonly IReadOnlyList<TextLine> value;
        private readonly IReadOnlyList<TextLine> detail;
        private readonly float shape;

        public Box(Typesetter typesetter, KeyFigure figure, float width)
        {
            (this.typesetter, this.figure, this.width) = (typesetter, figure, width);
            shape = figure.Mark == StatusMark.None ? 0 : 16;
            label = typesetter.Break(Labelled(), TextStyle.Head, width);
            valueStyle = Fit();
            value = typesetter.Break(figure.Value, valueStyle, width - shape);
            detail = typesetter.Break(figure.Detail, TextStyle.Note, width);
        }

        public float LabelHeight => label.Count * TextStyle.Head.Leading;

        public float Height => Top + LabelHeight + (value.Count * valueStyle.Leading) + BelowValue + (detail.Count * TextStyle.Note.Leading);

        public void Draw(SKCanvas canvas, SKPoint at, float labelHeight)
        {
            using var rule = new SKPaint { Color = Palette.Ink, IsStroke = true, StrokeWidth = 0.75f };
            canvas.DrawLine(at.X, at.Y, at.X + width, at.Y, rule);
            var y = at.Y + Top;
            typesetter.Draw(canvas, label, TextStyle.Head, new SKPoint(at.X, y), width, Alignment.Left);
            y += labelHeight;
            if (shape > 0)
                StatusShape.Draw(canvas, figure.Mark, at.X + 6, y + (valueStyle.Leading / 2), 12);
            typesetter.Draw(canvas, value, valueStyle, new SKPoint(at.X + shape, y), width, Alignment.Left);
            y += (value.Count * valueStyle.Leading) + BelowValue;
            typesetter.Draw(canvas, detail, TextStyle.Note, new SKPoint(at.X, y), width, Alignment.Left);
        }

        private RichText Labelled() => figure.Unit.Length == 0 ? figure.Label : $"{figure.Label}, {figure.Unit}";

        // A long figure is set smaller before it is broken.
        private TextStyle Fit()
        {
            var style = TextStyle.Figure;
            while (style.Size > Smallest && typesetter.WidestWord(figure.Value, style) > width - shape)
                style = style with { Size = style.Size - 1 };

            return style;
        }
    }
}
