using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using ScottPlot;
using SkiaSharp;
using Alignment = ScottPlot.Alignment;
using Palette = RiskWorker.Reporting.Drawing.Palette;

namespace RiskWorker.Reporting.Charts;

/// <summary>Draws a <see cref="ModelChart"/>; the model of record is a filled dot, the others open ones, so that it reads in grey print.</summary>
internal sealed class ModelPainter(ModelChart chart, Typesetter typesetter)
{
    private const float LongestName = 170;
    private const float Right = 8;
    private readonly PlotFrame frame = new(typesetter, gridAcross: false);

    public Action<SKCanvas, SKPoint> Paint(SKSize size)
    {
        var (least, most) = ModelChart.Range(chart.Panels);
        (least, most) = (chart.Lowest ?? least, Math.Max(chart.Highest ?? most, (chart.Lowest ?? least) + 1));
        var scale = MoneyScale.For(Math.Max(Math.Abs(least), most), chart.Currency);
        var lines = chart.Panels.SelectMany(panel => panel.Rows.Select(row => (ModelRow?)row).Prepend(null)).ToList();
        var names = lines.Select(row => row is null ? "" : typesetter.Cut(row.Name, PlotFrame.TickStyle, LongestName)).ToArray();
        var left = frame.Left(-lines.Count + 0.4, 0.6, ([.. lines.Select((_, i) => (double)-i)], names), "");
        var words = chart.Panels.SelectMany(panel => panel.Rows).Select(row => typesetter.Width(typesetter.Clean(Text(row, scale)), PlotFrame.TickStyle)).DefaultIfEmpty(0).Max() + 12;
        var low = least < 0 ? least - ((most - least) * 0.04) : 0;
        var right = Axis(size.Width - left - Right);
        if (right > Right)
            Axis(size.Width - left - right);
        var y = 0;
        var perPoint = (frame.Plot.Axes.Bottom.Max - low) / (size.Width - left - Math.Max(right, Right));
        foreach (var panel in chart.Panels)
        {
            Panel(panel, y, (low, perPoint), scale);
            y -= panel.Rows.Count + 1;
        }

        return frame.Draw(size, new PixelPadding(left, Math.Max(right, Right), 30, 2));

        // The axis runs on until the longest figure fits beside the largest value.
        float Axis(float across)
        {
            var high = most + ((most - low) * words / Math.Max(across - words, 1));
            return frame.Bottom(low, high, frame.TicksAcross(low, high, across, scale.Divisor), $"loss, {scale.Unit}");
        }
    }

    private static string Text(ModelRow row, MoneyScale scale) => row.Ratio.Length > 0 ? $"{scale.Text(row.Value)} ({row.Ratio})" : scale.Text(row.Value);

    private void Panel(ModelPanel panel, int top, (double Low, double PerPoint) axis, MoneyScale scale)
    {
        frame.Text(panel.Name, axis.Low, top, Alignment.MiddleLeft, Palette.Ink, dx: 4, strong: true);
        var record = panel.Rows.FirstOrDefault(row => row.IsRecord);
        if (record is not null)
            frame.Line(record.Value, top - 0.5, record.Value, top - panel.Rows.Count - 0.4, Palette.Accent, 0.6f, LinePattern.Dotted);
        for (var i = 0; i < panel.Rows.Count; i++)
            Row(panel.Rows[i], top - i - 1, scale, record?.Value, axis.PerPoint);
    }

    private void Row(ModelRow row, double y, MoneyScale scale, double? line, double perPoint)
    {
        if (row.Low is not null || row.High is not null)
            frame.Line(row.Low ?? row.Value, y, row.High ?? row.Value, y, row.IsRecord ? Palette.Accent : Palette.Body, 1.8f);
        frame.Plot.Add.Marker(row.Value, y, MarkerShape.FilledCircle, 5, PlotFrame.Of(row.IsRecord ? Palette.Accent : Palette.Paper));
        frame.Plot.Add.Marker(row.Value, y, MarkerShape.OpenCircle, 5, PlotFrame.Of(Palette.Accent)).LineWidth = 1.1f;
        var right = Math.Max(row.Value, row.High ?? row.Value);

        // The figure stands beside its bar; a line that would cross it moves it to the line's right.
        if (line > right && line < right + ((typesetter.Width(typesetter.Clean(Text(row, scale)), PlotFrame.TickStyle) + 9) * perPoint))
            right = line.Value;
        frame.Text(Text(row, scale), right, y, Alignment.MiddleLeft, Palette.Ink, dx: 6);
    }
}
