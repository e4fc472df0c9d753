using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>A row of <c>Data/closed-form-examples.csv</c> (Data/README.md): inputs as <c>name=value</c> joined by semicolons.</summary>
internal sealed record ClosedFormExample(string Id, string Topic, IReadOnlyDictionary<string, double> Inputs, double Expected, string Printed)
{
    public static IEnumerable<ClosedFormExample> Rows(string prefix) =>
        Table.Rows("closed-form-examples.csv").Where(row => row[0].StartsWith(prefix, StringComparison.Ordinal)).Select(Read);

    public double this[string input] => Inputs[input];

    /// <summary>Today's market; b is the cost of carry.</summary>
    public MarketPoint Today => new(0, this["S"], this["r"] * this["T"], (this["r"] - this["b"]) * this["T"], this["sigma"] * Math.Sqrt(this["T"]));

    /// <summary>Holds a value to the printed figure as well, where it agrees with the computed one.</summary>
    public void AssertIs(double value, double precision)
    {
        Assert.True(Math.Abs(value - Expected) <= precision, $"{Id}: {value:R}, expected {Expected:R}.");
        if (Printed.Length == 0)
            return;
        int decimals = Printed.Length - Printed.IndexOf('.', StringComparison.Ordinal) - 1;
        Assert.Equal(Table.Number(Printed), Math.Round(value, decimals), 1e-12);
    }

    private static ClosedFormExample Read(string[] row)
    {
        string text = row[2][(row[2].IndexOf(':', StringComparison.Ordinal) + 1)..].Replace("r=b=", "b=", StringComparison.Ordinal);
        Dictionary<string, double> inputs = new(StringComparer.Ordinal);
        foreach (string[] pair in text.Split(';').Select(part => part.Split('=')).Where(pair => pair.Length == 2 && double.TryParse(pair[1], out _)))
            inputs[pair[0].Trim()] = Table.Number(pair[1]);
        if (inputs.TryGetValue("b", out double carry))
            inputs.TryAdd("r", carry);
        return new(row[0], row[1], inputs, Table.Number(row[3]), row[8].StartsWith("agrees", StringComparison.Ordinal) ? row[7] : "");
    }
}
