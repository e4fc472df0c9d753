using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>A row of the files that <c>Data/make_closed_forms.py</c> makes: a name, a scenario, a strike, terms of its kind, the value.</summary>
internal sealed record ClosedFormReference(string Name, double Spot0, MarketPoint At, double Strike, string[] Terms, double Head, double Tail)
{
    public static IEnumerable<ClosedFormReference> Rows(string file) => Table.Rows(file).Select(Read);

    /// <summary>S e^(-qT) + K e^(-rT): what the value is the difference of parts of.</summary>
    public double Levels => (At.Spot * Math.Exp(-At.Carry)) + (Strike * Math.Exp(-At.Discount));

    /// <summary>How many times over w the logarithms that d is made of are: their rounding comes so often into the value.</summary>
    public double Conditioning => 1 + ((Math.Abs(Math.Log(Spot0 / Strike)) + Math.Abs(At.X) + Math.Abs(At.Discount) + Math.Abs(At.Carry)) / At.Deviation);

    public double Number(int term) => Table.Number(Terms[term]);

    /// <summary>Error of <paramref name="value"/>.</summary>
    public double ErrorOf(double value) => Math.Abs(value - Head - Tail);

    private static ClosedFormReference Read(string[] row)
    {
        double[] n = [.. row.Skip(1).Take(6).Select(Table.Number)];
        return new(row[0], n[1], MarketBlock.Point(n[0], n[1], n[2], n[3], n[4]), n[5], row[7..^2], Table.Number(row[^2]), Table.Number(row[^1]));
    }
}
