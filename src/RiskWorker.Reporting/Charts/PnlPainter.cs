using System.Globalization;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using ScottPlot;
using SkiaSharp;
using Alignment = ScottPlot.Alignment;
using Palette = RiskWorker.Reporting.Drawing.Palette;

namespace RiskWorker.Reporting.Charts;

/// <summary>
/// Draws a <see cref="PnlChart"/>: a stem a day, the band down to -VaR tinted below its line, exceptions as red diamonds, days
/// without P&amp;L or VaR as grey columns below a cross.
/// </summary>
internal sealed class PnlPainter(PnlChart chart, Typesetter typesetter)
{
    private const float Right = 4;
    private readonly PlotFrame frame = new(typesetter);

    public Action<SKCanvas, SKPoint> Paint(SKSize size)
    {
        var (low, high) = PnlRange.Of(chart);
        var scale = MoneyScale.For(Math.Max(Math.Abs(low), Math.Abs(high)), chart.Currency);
        var last = Math.Max(chart.Days.Count, 1) + 0.5;
        var name = "\u2212" + chart.VarName;
        var left = frame.Left(low, high, AxisTicks.Between(low, high, 5, scale.Divisor), $"P&L, {scale.Unit}");
        frame.Bottom(-1.5, last + Room(name, last, size.Width - left - Right), Months(), "");
        Gaps(low, high);
        Band();
        Stems();
        frame.Line(-1.5, 0, last, 0, Palette.Grey, 0.6f);
        Exceptions();
        if (chart.Days.LastOrDefault(day => day.Var is not null)?.Var is { } var)
            frame.Text(name, last, -var, Alignment.MiddleLeft, Palette.Accent, dx: 2, strong: true);
        return frame.Draw(size, new PixelPadding(left, Right, 18, 6));
    }

    // Words beside the data would be clipped, so the axis runs on below them: days such that the words fit.
    private double Room(string words, double last, float width)
    {
        var text = typesetter.Width(typesetter.Clean(words), PlotFrame.TickStyle with { Strong = true }) + 5;
        return (last + 1.5) * text / (width - text);
    }

    private (double[] Positions, string[] Labels) Months()
    {
        var firsts = chart.Days.Select((day, i) => (day.Date, Index: (double)i))
            .Where((day, i) => i > 0 && day.Date.Month != chart.Days[i - 1].Date.Month)
            .ToList();
        if (firsts.Count == 0 && chart.Days.Count > 0)
            firsts.Add((chart.Days[0].Date, 0));
        var every = firsts.Where((_, i) => i % (1 + (firsts.Count / 8)) == 0).ToList();
        return ([.. every.Select(day => day.Index)], [.. every.Select(day => day.Date.ToString("yyyy-MM", CultureInfo.InvariantCulture))]);
    }

    private void Gaps(double low, double high)
    {
        for (var i = 0; i < chart.Days.Count; i++)
        {
            var first = i;
            while (i < chart.Days.Count && chart.Days[i] is not { Pnl: not null, Var: not null })
                i++;
            if (i == first)
                continue;

            var column = frame.Plot.Add.Rectangle(first - 0.5, i - 0.5, low, high);
            (column.FillColor, column.LineWidth) = (PlotFrame.Of(Palette.Track), 0);
            var cross = frame.Plot.Add.Marker((first + i - 1) / 2.0, high - ((high - low) * 0.03), MarkerShape.Eks, 3.5f, PlotFrame.Of(Palette.Ink));
            cross.LineWidth = 0.8f;
        }
    }

    // One stretch of line for each run of days that have a VaR, stepped at the middle between days.
    private void Band()
    {
        for (var first = 0; first < chart.Days.Count; first++)
        {
            var xs = new List<double>();
            var ys = new List<double>();
            for (; first < chart.Days.Count && chart.Days[first].Var is { } var; first++)
            {
                xs.AddRange([first - 0.5, first + 0.5]);
                ys.AddRange([-var, -var]);
            }

            if (xs.Count == 0)
                continue;

            var fill = frame.Plot.Add.FillY([.. xs], [.. ys], new double[xs.Count]);
            fill.FillColor = PlotFrame.Of(Palette.Tint);
            fill.LineWidth = 0;
            var line = frame.Plot.Add.ScatterLine(xs.ToArray(), ys.ToArray());
            (line.LineWidth, line.Color) = (1.1f, PlotFrame.Of(Palette.Accent));
        }
    }

    private void Stems()
    {
        var bars = chart.Days.Select((day, i) => (day, i)).Where(one => one.day.Pnl is not null).Select(one => new Bar
        {
            Position = one.i,
            Value = one.day.Pnl!.Value,
            Size = 0.62,
            FillColor = PlotFrame.Of(one.day.Exception ? Palette.Bad : Palette.Body),
            LineWidth = 0,
        });
        frame.Plot.Add.Bars(bars.ToArray());
    }

    private void Exceptions()
    {
        for (var i = 0; i < chart.Days.Count; i++)
        {
            if (chart.Days[i].Exception)
                frame.Plot.Add.Marker(i, chart.Days[i].Pnl ?? 0, MarkerShape.FilledDiamond, 6.5f, PlotFrame.Of(Palette.Bad));
        }
    }
}
