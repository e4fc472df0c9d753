using System.Globalization;
using System.Text;

namespace RiskWorker.Domain.Runs;

/// <summary>
/// The hash that says whether two runs gave the same figures to the last bit: SHA-256 over nodes, limits and backtest
/// in the order of results.json, each number as the 16 hex digits of its bits.
/// </summary>
public static class FiguresHash
{
    /// <summary>The hash of <paramref name="results"/> as 64 lower-case hex digits.</summary>
    public static string Of(RunResults results)
    {
        var text = new StringBuilder();
        foreach (var node in results.Nodes)
        {
            text.Append("node ").Append(node.Book).Append(' ').Append(node.Parent ?? "-").Append(' ').Append(node.Currency).Append(' ');
            Bits(text, node.Value).Append('\n');
            foreach (var measure in node.Measures) Measure(text, "measure", measure);
            foreach (var measure in node.MeasuresRoot ?? []) Measure(text, "root", measure);
        }
        foreach (var limit in results.Limits)
        {
            text.Append("limit ").Append(limit.Limit.Name).Append(' ').Append(limit.Limit.Book).Append(' ');
            Spec(text, limit.Limit.Measure);
            Bits(text, limit.Limit.Amount);
            Bits(text, limit.Value);
            Bits(text, limit.Used).Append(limit.Status).Append('\n');
        }
        foreach (var count in results.Backtest)
        {
            text.Append(CultureInfo.InvariantCulture, $"backtest {count.Book} {count.Confidence} {count.Days} {count.Exceptions} {count.Zone?.ToString() ?? "-"}\n");
        }
        return SnapshotHash.OfText(text.ToString());
    }

    private static void Measure(StringBuilder text, string label, MeasureResult measure)
    {
        text.Append(label).Append(' ');
        Spec(text, measure.Spec);
        Bits(text, measure.Value);
        Bits(text, measure.Low);
        Bits(text, measure.High);
        Bits(text, measure.Level);
        if (measure.Sample is { } sample) Bits(Bits(text.Append("sample "), sample.Low), sample.High);
        text.Append('\n');
    }

    private static void Spec(StringBuilder text, MeasureSpec spec) =>
        text.Append(CultureInfo.InvariantCulture, $"{spec.Kind} {spec.Confidence.Level} {spec.Horizon.Days} ");

    private static StringBuilder Bits(StringBuilder text, double? value) =>
        (value is { } number ? text.Append(BitConverter.DoubleToUInt64Bits(number).ToString("x16", CultureInfo.InvariantCulture)) : text.Append('-')).Append(' ');
}
