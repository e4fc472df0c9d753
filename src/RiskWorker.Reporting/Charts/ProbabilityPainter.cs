using RiskWorker.Reporting.Drawing;
using ScottPlot;
using SkiaSharp;
using Alignment = ScottPlot.Alignment;
using Palette = RiskWorker.Reporting.Drawing.Palette;

namespace RiskWorker.Reporting.Charts;

/// <summary>Draws a <see cref="ProbabilityChart"/>: a bar a bin, the expected number as a labelled line, what is usual as a tinted band.</summary>
internal sealed class ProbabilityPainter(ProbabilityChart chart, Typesetter typesetter)
{
    private const string Expected = "expected";
    private readonly PlotFrame frame = new(typesetter);

    public Action<SKCanvas, SKPoint> Paint(SKSize size)
    {
        var bins = Math.Max(chart.Counts.Count, 1);
        var expected = chart.Counts.Sum() / (double)bins;
        var top = Math.Max(Math.Max(chart.Counts.DefaultIfEmpty(0).Max(), chart.High ?? 0), 1) * 1.08;
        var left = frame.Left(0, top, AxisTicks.Between(0, top, 3, 1), "days");
        var words = typesetter.Width(typesetter.Clean(Expected), PlotFrame.TickStyle with { Strong = true }) + 5;
        var end = 1 + (words / Math.Max(size.Width - left - words, 1));
        frame.Bottom(0, end, AxisTicks.Between(0, 1, 5, 1), "probability of a P&L at or below the day's");
        Usual();
        Bars(bins);
        frame.Line(0, expected, 1, expected, Palette.Ink, 0.9f, LinePattern.Dashed);
        frame.Text(Expected, 1, expected, Alignment.MiddleLeft, Palette.Ink, dx: 3, strong: true);
        frame.Line(0, 0, 1, 0, Palette.Grey, 0.6f);
        return frame.Draw(size, new PixelPadding(left, 2, 30, 4));
    }

    private void Usual()
    {
        if ((chart.Low, chart.High) is not ({ } low, { } high))
            return;

        var band = frame.Plot.Add.Rectangle(0, 1, low, high);
        (band.FillColor, band.LineWidth) = (PlotFrame.Of(Palette.Track), 0);
    }

    private void Bars(int bins) => frame.Plot.Add.Bars(chart.Counts.Select((count, i) => new Bar
    {
        Position = (i + 0.5) / bins,
        Value = count,
        Size = 0.72 / bins,
        FillColor = PlotFrame.Of(Palette.Body),
        LineWidth = 0,
    }).ToArray());
}
