using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using ScottPlot;
using SkiaSharp;
using Alignment = ScottPlot.Alignment;
using Palette = RiskWorker.Reporting.Drawing.Palette;

namespace RiskWorker.Reporting.Charts;

/// <summary>
/// Draws a <see cref="DistributionChart"/>: bars of share per bin, the tail beyond the nearest mark darker, what lies
/// outside the bins as an outlined bar at each end, and each measure's line labelled on a row of its own above the bars.
/// </summary>
internal sealed class DistributionPainter(DistributionChart chart, Typesetter typesetter)
{
    private const double RowShare = 0.1;
    private readonly PlotFrame frame = new(typesetter);
    private readonly double total = Math.Max(chart.Counts.Sum() + chart.Below + chart.Above, 1);

    private double LastEdge => chart.FirstEdge + (chart.BinWidth * chart.Counts.Count);

    public Action<SKCanvas, SKPoint> Paint(SKSize size)
    {
        var low = Math.Min(chart.FirstEdge - (2.5 * chart.BinWidth), chart.Marks.Select(mark => -mark.Loss).DefaultIfEmpty(0).Min() - chart.BinWidth);
        var high = LastEdge + (2.5 * chart.BinWidth);
        var peak = Share(chart.Counts.Append(chart.Below).Append(chart.Above).Max());
        var top = Math.Max(peak, 1e-9) * (1.06 + (RowShare * chart.Marks.Count));
        var scale = MoneyScale.For(Math.Max(Math.Abs(low), Math.Abs(high)), chart.Currency);
        var left = frame.Left(0, top, AxisTicks.Between(0, Math.Max(peak, 1e-6), 4, 0.01), "share of scenarios, %");
        var right = frame.Bottom(low, high, frame.TicksAcross(low, high, size.Width - left, scale.Divisor), $"P&L, {scale.Unit}");
        Bars();
        Ends(low, high);
        frame.Line(low, 0, high, 0, Palette.Grey, 0.6f);
        Marks(low, high, top, scale, size.Width - left - right);
        return frame.Draw(size, new PixelPadding(left, right, 30, 6));
    }

    private double Share(long count) => count / total;

    private void Bars()
    {
        var tail = chart.Marks.Select(mark => -mark.Loss).DefaultIfEmpty(double.NegativeInfinity).Max();
        var bars = chart.Counts.Select((count, i) => (Centre: chart.FirstEdge + ((i + 0.5) * chart.BinWidth), count))
            .Where(bin => bin.count > 0)
            .Select(bin => Bar(bin.Centre, bin.count, bin.Centre < tail ? Palette.Accent : Palette.Body));
        frame.Plot.Add.Bars(bars.ToArray());
    }

    private Bar Bar(double centre, long count, SKColor color) => new()
    {
        Position = centre,
        Value = Share(count),
        Size = chart.BinWidth,
        FillColor = PlotFrame.Of(color),
        LineWidth = 0.25f,
        LineColor = PlotFrame.Of(Palette.Paper),
    };

    private void Ends(double low, double high)
    {
        End(chart.FirstEdge - (1.5 * chart.BinWidth), chart.Below, Alignment.LowerLeft, low);
        End(LastEdge + (1.5 * chart.BinWidth), chart.Above, Alignment.LowerRight, high);
    }

    // Outlined, not filled: its width is not to scale.
    private void End(double centre, long count, Alignment alignment, double edge)
    {
        if (count == 0)
            return;

        var bar = Bar(centre, count, Palette.Paper);
        (bar.LineWidth, bar.LineColor) = (0.7f, PlotFrame.Of(Palette.Accent));
        frame.Plot.Add.Bar(bar);
        frame.Text($"{Numerals.Count(count)} beyond", edge, Share(count), alignment, Palette.Grey, dy: -2);
    }

    private void Marks(double low, double high, double top, MoneyScale scale, float width)
    {
        var marks = chart.Marks.OrderByDescending(mark => mark.Loss).ToList();
        for (var i = 0; i < marks.Count; i++)
        {
            var x = -marks[i].Loss;
            var y = top * (1 - (RowShare * (i + 0.4)));
            var text = $"{marks[i].Name}: {scale.Text(marks[i].Loss)}";
            var room = (x - low) / (high - low) * width;
            var left = room > typesetter.Width(typesetter.Clean(text), PlotFrame.TickStyle with { Strong = true }) + 8;
            frame.Line(x, 0, x, y, Palette.Ink, 0.9f, i == 0 ? null : LinePattern.Dashed);
            frame.Text(text, x, y, left ? Alignment.MiddleRight : Alignment.MiddleLeft, Palette.Ink, dx: left ? -4 : 4, strong: true);
        }
    }
}
