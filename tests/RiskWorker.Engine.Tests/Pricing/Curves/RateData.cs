using System.Globalization;
using System.Text.RegularExpressions;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

/// <summary>Worked examples and yields (Data/rates/README.md).</summary>
internal static partial class RateData
{
    /// <summary>The recomputed figure of an example and its tolerance.</summary>
    public static (double Expected, double Tolerance) Example(string id)
    {
        string[] row = [.. Field().Matches(Lines("worked-examples.csv").Single(l => l.StartsWith(id + ",", StringComparison.Ordinal))).Select(m => m.Value)];
        return (Number(row[3]), Number(row[4]));
    }

    /// <summary>Yields of 1, 3, 5 and 10 years by day, as decimals.</summary>
    public static double[][] Yields() => [.. Lines("treasury-yields.csv").Skip(1).Select(l => l.Split(',').Skip(2).Select(y => Number(y) / 100).ToArray())];

    private static string[] Lines(string file) => File.ReadAllLines(Path.Combine(AppContext.BaseDirectory, "Data", "rates", file));

    private static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);

    [GeneratedRegex("(?<=^|,)(?:\"[^\"]*\"|[^,]*)(?=,|$)")]
    private static partial Regex Field();
}
