using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>Turns blocks into fragments of a width: the one place that knows every kind of block.</summary>
internal sealed class BlockLayout(Typesetter typesetter)
{
    // What follows a heading belongs to it: the block's own white space gives way.
    private const float BelowHeading = 3;

    public IReadOnlyList<Fragment> Layout(ReportDocument document)
    {
        var fragments = new List<Fragment>();
        foreach (var section in document.Sections.Where(section => section.Blocks.Count > 0))
        {
            if (section.StartsPage)
                fragments.Add(Fragment.Break());
            fragments.AddRange(Layout(section.Blocks, PageGeometry.BodyWidth));
        }

        foreach (var text in (string[])[document.Title, document.Running, document.Foot])
            typesetter.Clean(text);
        if (typesetter.Missing.Any)
            fragments.AddRange(Layout(new Paragraph(typesetter.Missing.Sentence(), Voice.Note), PageGeometry.BodyWidth));
        return fragments;
    }

    private List<Fragment> Layout(IReadOnlyList<Block> blocks, float width)
    {
        var fragments = new List<Fragment>();
        for (var i = 0; i < blocks.Count; i++)
        {
            var first = fragments.Count;
            fragments.AddRange(Layout(blocks[i], width));
            if (i > 0 && blocks[i - 1] is Heading && blocks[i] is not (Callout or KeyFigures) && first < fragments.Count)
                fragments[first] = fragments[first] with { SpaceBefore = Math.Min(fragments[first].SpaceBefore, BelowHeading) };
        }

        return fragments;
    }

    private IEnumerable<Fragment> Layout(Block block, float width) => block switch
    {
        Heading heading => TextLayout.Heading(typesetter, heading, width),
        Paragraph paragraph => TextLayout.Paragraph(typesetter, paragraph, width),
        Callout callout => CalloutLayout.Layout(typesetter, callout, width),
        KeyFigures figures => KeyFiguresLayout.Layout(typesetter, figures, width),
        Facts facts => FactsLayout.Layout(typesetter, facts, width),
        Table table => new TableLayout(typesetter, table, width).Layout(),
        Figure figure => FigureLayout.Layout(typesetter, figure, width),
        Columns columns => SideBySide(columns, width),
        Spacer spacer => [new Fragment(0, (_, _) => { }) { SpaceBefore = spacer.Points }],
        PageBreak => [Fragment.Break()],
        _ => throw new ArgumentException($"A block of type {block.GetType().Name} has no layout."),
    };

    private IEnumerable<Fragment> SideBySide(Columns columns, float width)
    {
        const float gutter = 26;
        var leftWidth = (float)((width - gutter) * columns.LeftShare);
        var left = Layout(columns.Left, leftWidth);
        var right = Layout(columns.Right, width - gutter - leftWidth);
        var height = Math.Max(Height(left), Height(right));
        if (height > PageGeometry.BodyHeight)
            return Layout(columns.Left, width).Concat(Layout(columns.Right, width));

        var space = Math.Max(left.FirstOrDefault()?.SpaceBefore ?? 0, right.FirstOrDefault()?.SpaceBefore ?? 0);
        return [new Fragment(height, Draw) { SpaceBefore = space }];

        void Draw(SKCanvas canvas, SKPoint at)
        {
            Stack(canvas, left, at);
            Stack(canvas, right, new SKPoint(at.X + leftWidth + gutter, at.Y));
        }
    }

    private static float Height(List<Fragment> stack) => stack.Sum(one => one.Extent) - (stack.FirstOrDefault()?.SpaceBefore ?? 0);

    private static void Stack(SKCanvas canvas, List<Fragment> stack, SKPoint at)
    {
        var y = at.Y - (stack.FirstOrDefault()?.SpaceBefore ?? 0);
        foreach (var fragment in stack)
        {
            fragment.Draw(canvas, new SKPoint(at.X, y + fragment.SpaceBefore));
            y += fragment.Extent;
        }
    }
}
