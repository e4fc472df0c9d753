using RiskWorker.Numerics.Distributions;

namespace RiskWorker.Numerics.Tests.Distributions;

/// <summary>Every row of <c>Data/student-reference.csv</c> (fifty-digit arithmetic; Data/README.md says how it is made again).</summary>
public sealed class StudentReferenceTests
{
    [Theory]
    [InlineData("mixing", 1e-13)]
    [InlineData("lower", 5e-14)]
    [InlineData("upper", 5e-14)]
    [InlineData("tail", 2e-14)]
    [InlineData("quantile", 5e-15)]
    [InlineData("map", 3e-14)]
    public void Values_equal_fifty_digit_arithmetic_relatively(string kind, double precision)
    {
        var values = Rows(kind).Select(row => (row, Value(kind, row))).ToArray();
        Assert.True(values.Length >= 40);
        Assert.All(values, pair => Assert.InRange(pair.Item2 / pair.row.Expected, 1 - precision, 1 + precision));
    }

    [Theory]
    [InlineData("density")]
    [InlineData("loggamma")]
    public void Logarithms_equal_fifty_digit_arithmetic_to_rounding(string kind) => Assert.All(
        Rows(kind),
        row => Assert.InRange(Math.Abs(Value(kind, row) - row.Expected) / Math.Max(1, Math.Abs(row.Expected)), 0, 1.2e-15));

    private static double Value(string kind, (double A, double B, double X, double Expected) row) => kind switch
    {
        "mixing" => new MixingQuantile(row.A).Of(row.X),
        "lower" => ChiSquare.LowerTail(row.A, row.X),
        "upper" => ChiSquare.UpperTail(row.A, row.X),
        "density" => new StudentT(row.A).LogDensity(row.X),
        "tail" => new StudentT(row.A).Upper(row.X),
        "quantile" => new StudentT(row.A).UpperQuantile(row.X),
        "map" => MarginMap.ToUnitVariance(row.A, row.B).Of(row.X),
        _ => LogGamma.Of(row.X),
    };

    private static IEnumerable<(double A, double B, double X, double Expected)> Rows(string kind) => Table.Rows("student-reference.csv")
        .Where(row => row[0] == kind)
        .Select(row => (Optional(row[1]), Optional(row[2]), Table.Number(row[3]), Table.Number(row[4])));

    private static double Optional(string text) => text.Length == 0 ? 0 : Table.Number(text);
}
