using System.Globalization;
using System.Text.Json;
using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Tests.Calibration;

/// <summary>Four stock indices, 1,860 closes, and their statistics (Data/eustock/README.md).</summary>
internal static class IndexCloses
{
    public static readonly string[] Names = ["DAX", "SMI", "CAC", "FTSE"];

    public static Market Market()
    {
        var market = new Market();
        foreach (var name in Names) market.Factors.Add(new(name, FactorClass.Equity, ShockKind.Lognormal));
        foreach (var line in File.ReadLines(Path.Combine(Folder, "closes.csv")).Skip(1))
        {
            var fields = line.Split(',');
            var date = DateOnly.ParseExact(fields[0], "yyyy-MM-dd", CultureInfo.InvariantCulture);
            for (var j = 0; j < Names.Length; j++) market.Observations.Add(new(date, Names[j], double.Parse(fields[j + 1], CultureInfo.InvariantCulture)));
        }
        return market;
    }

    public static double[] Vector(string key) => JsonSerializer.Deserialize<double[]>(Expected(key))!;

    public static double[][] Matrix(string key) => JsonSerializer.Deserialize<double[][]>(Expected(key))!;

    private static string Folder => Path.Combine(AppContext.BaseDirectory, "Data", "eustock");

    private static JsonElement Expected(string key)
    {
        using var document = JsonDocument.Parse(File.ReadAllText(Path.Combine(Folder, "expected.json")));
        return document.RootElement.GetProperty(key).Clone();
    }
}
