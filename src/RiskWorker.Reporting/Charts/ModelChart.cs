namespace RiskWorker.Reporting.Charts;

/// <summary>Measures by model on one scale: a panel a measure, in it a dot and a bar a model.</summary>
/// <param name="Panels">The panels, top to bottom.</param>
/// <param name="Currency">The currency's code.</param>
/// <param name="Lowest">The lower end of the axis, shared by charts read together; null to fit the rows.</param>
/// <param name="Highest">The upper end of the axis; null to fit the rows.</param>
public sealed record ModelChart(IReadOnlyList<ModelPanel> Panels, string Currency, double? Lowest = null, double? Highest = null) : ChartSpec
{
    /// <summary>The least and the largest figure of panels, zero and the ends of intervals included.</summary>
    public static (double Low, double High) Range(IReadOnlyList<ModelPanel> panels)
    {
        ArgumentNullException.ThrowIfNull(panels);
        var values = panels.SelectMany(panel => panel.Rows).SelectMany(row => (double?[])[row.Value, row.Low, row.High]).OfType<double>().Where(double.IsFinite).Append(0).ToList();
        return (values.Min(), values.Max());
    }
}

/// <summary>One measure of a <see cref="ModelChart"/>.</summary>
/// <param name="Name">The measure: VaR 99%, 1 day.</param>
/// <param name="Rows">A row a model.</param>
public sealed record ModelPanel(string Name, IReadOnlyList<ModelRow> Rows);

/// <summary>One model of a <see cref="ModelPanel"/>.</summary>
/// <param name="Name">The model.</param>
/// <param name="Value">The measure, in money.</param>
/// <param name="Low">The lower end of its interval; null where there is none.</param>
/// <param name="High">The upper end of its interval; null where there is none.</param>
/// <param name="IsRecord">Whether it is the model of record, whose value an upright line carries through the panel.</param>
/// <param name="Ratio">Its ratio to the model of record as text; empty for none.</param>
public sealed record ModelRow(string Name, double Value, double? Low, double? High, bool IsRecord = false, string Ratio = "");
