using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using ScottPlot;
using SkiaSharp;
using Alignment = ScottPlot.Alignment;
using Palette = RiskWorker.Reporting.Drawing.Palette;

namespace RiskWorker.Reporting.Charts;

/// <summary>Draws a <see cref="MeasureChart"/>; the dot's shape follows the status, so that it reads in grey print.</summary>
internal sealed class MeasurePainter(MeasureChart chart, Typesetter typesetter)
{
    private const float LongestName = 170;
    private const float Right = 44;
    private readonly PlotFrame frame = new(typesetter, gridAcross: false);

    public Action<SKCanvas, SKPoint> Paint(SKSize size)
    {
        var values = chart.Rows.SelectMany(row => (double?[])[row.Value, row.Low, row.High, row.Limit]).OfType<double>().Append(0).ToList();
        var (least, most) = (values.Min(), Math.Max(values.Max(), values.Min() + 1));
        var (low, high) = (least < 0 ? least - ((most - least) * 0.04) : 0, most + ((most - least) * 0.16));
        var scale = MoneyScale.For(Math.Max(Math.Abs(least), most), chart.Currency);
        var names = chart.Rows.Select(row => typesetter.Cut(row.Name, PlotFrame.TickStyle, LongestName)).ToArray();
        var left = frame.Left(-chart.Rows.Count + 0.4, 0.6, ([.. chart.Rows.Select((_, i) => (double)-i)], names), "");
        var across = size.Width - left - Right;
        frame.Bottom(low, high, frame.TicksAcross(low, high, across, scale.Divisor), $"{chart.Axis}, {scale.Unit}");
        var perPoint = (high - low) / across;
        for (var i = 0; i < chart.Rows.Count; i++)
            Row(chart.Rows[i], -i, scale, perPoint);
        return frame.Draw(size, new PixelPadding(left, Right, 30, 2));
    }

    private void Row(MeasureRow row, double y, MoneyScale scale, double perPoint)
    {
        if (row.Low is { } low && row.High is { } high)
            frame.Line(low, y, high, y, Palette.Of(row.Mark), 1.6f);
        if (row.Limit is { } limit)
            frame.Line(limit, y - 0.36, limit, y + 0.36, Palette.Ink, 1.1f);
        frame.Plot.Add.Marker(row.Value, y, ShapeOf(row.Mark), 4.5f, PlotFrame.Of(Palette.Of(row.Mark)));
        var text = scale.Text(row.Value);
        var right = Math.Max(row.Value, row.High ?? row.Value);

        // The figure stands beside its dot; a limit that would cross the figure moves it to the limit's right.
        if (row.Limit > right && row.Limit < right + ((typesetter.Width(text, PlotFrame.TickStyle) + 9) * perPoint))
            right = row.Limit.Value;
        frame.Text(text, right, y, Alignment.MiddleLeft, Palette.Ink, dx: 6);
    }

    private static MarkerShape ShapeOf(StatusMark mark) => mark switch
    {
        StatusMark.Warning => MarkerShape.FilledTriangleUp,
        StatusMark.Undecided => MarkerShape.FilledDiamond,
        StatusMark.Bad => MarkerShape.FilledSquare,
        _ => MarkerShape.FilledCircle,
    };
}
