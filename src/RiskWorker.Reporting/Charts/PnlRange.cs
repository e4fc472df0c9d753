namespace RiskWorker.Reporting.Charts;

/// <summary>The vertical axis of a <see cref="PnlChart"/>.</summary>
internal static class PnlRange
{
    /// <summary>The axis that holds all days, with some air; charts read together take the wider of theirs.</summary>
    public static (double Low, double High) Of(PnlChart chart)
    {
        var values = chart.Days.SelectMany(day => (double?[])[day.Pnl, -day.Var, 0]).OfType<double>().DefaultIfEmpty(0).ToList();
        var (least, most) = (values.Min(), values.Max());
        var air = Math.Max((most - least) * 0.08, 1);
        return (chart.Lowest ?? (least - air), chart.Highest ?? (most + air));
    }
}
