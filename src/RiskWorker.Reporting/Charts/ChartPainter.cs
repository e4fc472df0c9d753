using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Charts;

/// <summary>Turns a chart's data into a drawing on a page's canvas: vectors, never a picture.</summary>
internal static class ChartPainter
{
    /// <summary>The drawing of a chart within a size; its words are checked for glyphs here, before any page is drawn.</summary>
    public static Action<SKCanvas, SKPoint> Paint(ChartSpec chart, Typesetter typesetter, SKSize size) => chart switch
    {
        DistributionChart distribution => new DistributionPainter(distribution, typesetter).Paint(size),
        PnlChart pnl => new PnlPainter(pnl, typesetter).Paint(size),
        MeasureChart measure => new MeasurePainter(measure, typesetter).Paint(size),
        ModelChart models => new ModelPainter(models, typesetter).Paint(size),
        ProbabilityChart probability => new ProbabilityPainter(probability, typesetter).Paint(size),
        _ => throw new ArgumentException($"A chart of type {chart.GetType().Name} has no painter."),
    };
}
