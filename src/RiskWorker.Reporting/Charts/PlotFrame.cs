using RiskWorker.Reporting.Drawing;
using ScottPlot;
using ScottPlot.TickGenerators;
using SkiaSharp;
using Color = ScottPlot.Color;
using Palette = RiskWorker.Reporting.Drawing.Palette;

namespace RiskWorker.Reporting.Charts;

/// <summary>The house style of a plot: no frame, hairline grid, ticks and words in the embedded typeface.</summary>
internal sealed class PlotFrame
{
    public const float TickSize = 7;
    public static readonly TextStyle TickStyle = TextStyle.Unit with { Size = TickSize };
    private readonly Typesetter typesetter;

    /// <param name="typesetter">Measures words and checks their glyphs.</param>
    /// <param name="gridAcross">Whether the grid lines run across, at the vertical axis's ticks, or else upright.</param>
    public PlotFrame(Typesetter typesetter, bool gridAcross = true)
    {
        EmbeddedFontResolver.Ensure();
        this.typesetter = typesetter;
        Plot.Font.Set(Faces.Family);
        Plot.FigureBackground.Color = Colors.Transparent;
        Plot.DataBackground.Color = Colors.Transparent;
        Plot.Axes.Frame(false);

        // On a page the canvas holds more than the chart: it must not be cleared.
        Plot.RenderManager.RenderActions.RemoveAll(action => action is ScottPlot.Rendering.RenderActions.ClearCanvas);
        Plot.Grid.XAxisStyle.IsVisible = !gridAcross;
        Plot.Grid.YAxisStyle.IsVisible = gridAcross;
        Plot.Grid.MajorLineColor = Of(Palette.Rule);
        Plot.Grid.MajorLineWidth = 0.4f;
        foreach (var axis in Plot.Axes.GetAxes())
            Quiet(axis);
    }

    public Plot Plot { get; } = new();

    public static Color Of(SKColor color) => Color.FromSKColor(color);

    /// <summary>Sets the horizontal axis and returns the room that its last tick's words need beyond the end of the axis.</summary>
    public float Bottom(double low, double high, (double[] Positions, string[] Labels) ticks, string label)
    {
        Axis(Plot.Axes.Bottom, low, high, ticks, label);
        return (Widest(ticks.Labels) / 2) + 1;
    }

    /// <summary>Sets the vertical axis and returns the room that its ticks and its label need at its left.</summary>
    public float Left(double low, double high, (double[] Positions, string[] Labels) ticks, string label)
    {
        Axis(Plot.Axes.Left, low, high, ticks, label);
        return Widest(ticks.Labels) + 8 + (label.Length > 0 ? 14 : 0);
    }

    /// <summary>Ticks for an axis of a length in points, so few that their words stay apart.</summary>
    public (double[] Positions, string[] Labels) TicksAcross(double low, double high, float length, double unit)
    {
        for (var most = 9; ; most--)
        {
            var ticks = AxisTicks.Between(low, high, most, unit);
            if (most == 1 || (Widest(ticks.Labels) + 14) * ticks.Labels.Length <= length)
                return ticks;
        }
    }

    /// <summary>Words at a place in the plot's coordinates, moved by points.</summary>
    public void Text(string text, double x, double y, Alignment alignment, SKColor color, float dx = 0, float dy = 0, bool strong = false)
    {
        var label = Plot.Add.Text(typesetter.Clean(text), x, y);
        Set(label.LabelStyle, color, strong);
        label.LabelAlignment = alignment;
        (label.OffsetX, label.OffsetY) = (dx, dy);
    }

    /// <summary>A straight line in the plot's coordinates.</summary>
    public void Line(double x1, double y1, double x2, double y2, SKColor color, float thickness, LinePattern? pattern = null)
    {
        var line = Plot.Add.Line(x1, y1, x2, y2);
        line.LineColor = Of(color);
        line.LineWidth = thickness;
        line.LinePattern = pattern ?? LinePattern.Solid;
        line.MarkerSize = 0;
    }

    /// <summary>The drawing of the plot within a size, its data area inset by the padding given.</summary>
    public Action<SKCanvas, SKPoint> Draw(SKSize size, PixelPadding padding)
    {
        Plot.Layout.Fixed(padding);
        return (canvas, at) =>
        {
            canvas.Save();
            canvas.Translate(at.X, at.Y);
            Plot.Render(canvas, new PixelRect(0, size.Width, size.Height, 0));
            canvas.Restore();
        };
    }

    private float Widest(string[] labels) =>
        labels.Select(label => typesetter.Width(typesetter.Clean(label), TickStyle)).DefaultIfEmpty(0).Max();

    private static void Quiet(IAxis axis)
    {
        axis.FrameLineStyle.Width = 0;
        axis.MajorTickStyle.Length = 0;
        axis.MinorTickStyle.Length = 0;
        Set(axis.TickLabelStyle, Palette.Grey, strong: false);
        Set(axis.Label, Palette.Grey, strong: false);
    }

    // Without subpixel positions letters are set on whole points, and words look badly spaced.
    private static void Set(LabelStyle style, SKColor color, bool strong)
    {
        style.FontName = Faces.Family;
        style.FontSize = TickSize;
        style.Bold = strong;
        style.ForeColor = Of(color);
        style.SubpixelText = true;
    }

    private void Axis(IAxis axis, double low, double high, (double[] Positions, string[] Labels) ticks, string label)
    {
        (axis.Min, axis.Max) = (low, high);
        axis.TickGenerator = new NumericManual(ticks.Positions, ticks.Labels);
        axis.Label.Text = typesetter.Clean(label);
    }
}
