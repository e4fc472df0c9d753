using System.Runtime.InteropServices;
using System.Security.Cryptography;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>
/// The first half of SHA-256 over the bits of 100,000 outputs of each kernel. The same values stand for every hardware and every setting; one
/// that changes moves the figures of stored runs and asks for a new numerics epoch.
/// </summary>
public sealed class KernelBitsTests
{
    private const int Count = 100_000;
    private const double Spot0 = 100.0;

    private static readonly Dictionary<string, Action<SeededNumbers, double[]>> Outputs = new()
    {
        [nameof(UniformDraws)] = (_, y) => UniformDraws.FillPair(Stream, ulong.MaxValue / 3, 5, y.AsSpan(0, Count / 2), y.AsSpan(Count / 2)),
        [nameof(NormalDraws)] = (_, y) => NormalDraws.FillPair(Stream, 0xFFFFFF00, 2, y.AsSpan(0, Count / 2), y.AsSpan(Count / 2)),
        [nameof(Exponential)] = (n, y) => Exponential.Of(Spread(n, -1, 1, -750, 712), y),
        [nameof(Logarithm)] = (n, y) => Logarithm.Of(AnyPositive(n), y),
        [nameof(NormalCdf)] = (n, y) => NormalCdf.Of(Spread(n, -6, 6, -39, 39), y),
        [nameof(NormalDensity)] = (n, y) => NormalDensity.Of(Spread(n, -6, 6, -39, 39), y),
        [nameof(InverseNormal)] = (n, y) => InverseNormal.Of(Spread(n, 0, 1, 0, 1e-9), y),
        [nameof(TriangularProduct)] = (n, y) => TriangularProduct.Multiply(n.Between(-1, 1, 250 * 150), 250, 150, n.Between(-4, 4, 150 * 400), y, 400),
        [nameof(LogNormalMoves)] = (n, y) => LogNormalMoves.Spots(Returns(n), Spot0, y),
        [nameof(LogNormalMoves.Levels)] = (n, y) => LogNormalMoves.Levels(n.Between(-6, 6, Count), 0.0007, 1e-5, 0.031, y),
        [nameof(EuropeanOption)] = OptionProfits,
        ["EuropeanOption at own volatility"] = OptionProfitsAtOwnVolatility,
        [nameof(MovedOption)] = (n, y) => ClosedForms(n, y, (in MarketSpans market, Span<double> profit) =>
            MovedOption.AccumulateValue(new(Spot0, n.Between(60, 160), n.Unit() < 0.5), market, n.Between(-100, 100), 5, profit)),
        [nameof(DigitalOption)] = (n, y) => ClosedForms(n, y, (in MarketSpans market, Span<double> profit) => DigitalOption.AccumulateValue(
            n.Unit() < 0.5
                ? DigitalOptionTerms.CashOrNothing(Spot0, n.Between(60, 160), 10, n.Unit() < 0.5)
                : DigitalOptionTerms.AssetOrNothing(Spot0, n.Between(60, 160), n.Unit() < 0.5),
            market, n.Between(-100, 100), 5, profit)),
        [nameof(BarrierOption)] = (n, y) => ClosedForms(n, y, (in MarketSpans market, Span<double> profit) => BarrierOption.AccumulateValue(
            new(Spot0, n.Between(60, 160), n.Between(70, 140), n.Unit() < 0.5, n.Unit() < 0.5, n.Unit() < 0.5, n.Unit() < 0.5 ? 0 : 4, 1, n.Unit() < 0.5 ? 0 : 0.004),
            market, n.Between(-100, 100), 5, profit)),
        [nameof(GeometricAsianOption)] = (n, y) => ClosedForms(n, y, (in MarketSpans market, Span<double> profit) => GeometricAsianOption.AccumulateValue(
            GeometricAsianTerms.Continuous(Spot0, n.Between(60, 160), 1, n.Between(-2, 1), n.Between(80, 120), n.Unit() < 0.5), market, n.Between(-100, 100), 5, profit)),
        [nameof(BookProfit)] = BookLosses,
        [nameof(Elementwise)] = CrossRates,
        ["Elementwise products"] = ScaledProducts,
        [nameof(CompoundJump)] = Jumps,
        [nameof(UnitScale)] = (n, y) => UnitScale.Apply(n.Between(-0.3, 0.3, Count), 3.7, 0.01, y),
        [nameof(PolynomialSum)] = Polynomials,
        [nameof(FourVariableSum)] = (n, y) => FourVariableSum.Add(
            n.Between(-50, 50, 9 * 5 * 3 * 4), 5, 3, 4, n.Between(-1, 1, Count), n.Between(-1, 1, Count), n.Between(-1, 1, Count), n.Between(-1, 1, Count), y),
        [nameof(BoundaryScale)] = (n, y) => BoundaryScale.Apply(n.Between(-0.3, 0.3, Count), n.Between(-0.5, 0.2, Count), 0.3, y),
        [nameof(Branch)] = Branches,
        [nameof(LaneSum)] = (n, y) => Sums(n.Between(-1e6, 1e6, 600), y),
    };

    private delegate void Held(in MarketSpans market, Span<double> profit);

    public static IEnumerable<string> Names => Outputs.Keys;

    private static DrawStream Stream => new(20_250_101, DrawPurpose.FactorMoves, 1);

    [Theory]
    [InlineData("UniformDraws", "95e54531151760163179f33f04c8b0e2")]
    [InlineData("NormalDraws", "20f1fb50250de7ae30f21ce50949bc55")]
    [InlineData("Exponential", "0015cdc2a39c7a275cdcd6f760243318")]
    [InlineData("Logarithm", "acd0ed11e78620bd95af08b8eb9a430d")]
    [InlineData("NormalCdf", "adc67faef084b012b99615e2735602d4")]
    [InlineData("NormalDensity", "fef94e38f5172aae8b4f3d3f8619a514")]
    [InlineData("InverseNormal", "2f9b83daa270e033ec99ae97d26a3304")]
    [InlineData("TriangularProduct", "740901deb566724a72f35a4adc538c17")]
    [InlineData("LogNormalMoves", "59ff726c0f3af0ab35d7dc8778b2dfcc")]
    [InlineData("Levels", "d6aefabddabeab3dd7d9ff6cfc07c044")]
    [InlineData("EuropeanOption", "b45aa79c3634d5bd7569d0648bf31b98")]
    [InlineData("EuropeanOption at own volatility", "64dfd4692444283dc1e9bcd9fe212fe4")]
    [InlineData("MovedOption", "1a793dc61222a370e236b13ebc36c46d")]
    [InlineData("DigitalOption", "a59dce82d9737a4b709f8554b6fdd115")]
    [InlineData("BarrierOption", "308619beeed94c48bbdb504f3ac1efdf")]
    [InlineData("GeometricAsianOption", "e373c228d445b289cebc7bb3071622d0")]
    [InlineData("BookProfit", "b588542cd2b8a658be2db308b372280d")]
    [InlineData("Elementwise", "e83c48058ffce0ed22fe7337fccb311e")]
    [InlineData("Elementwise products", "e0b7c81379080000150c149d50bf34a3")]
    [InlineData("CompoundJump", "36e7fd1cd0f9af23d5372d58ecccd7a5")]
    [InlineData("UnitScale", "849222ae93c6890bb75d188cf11d23d0")]
    [InlineData("PolynomialSum", "48de1c7b7d8e9610abe5836b526807d8")]
    [InlineData("FourVariableSum", "b1ebf22df992dfddca55f27cee5b3401")]
    [InlineData("BoundaryScale", "bcd573c277c54ea805ba1f4a0ef6a0e7")]
    [InlineData("Branch", "3a22e42d28e549be717a7d35e158cbfb")]
    [InlineData("LaneSum", "092d79c6bd865de46f059ec3ddc79409")]
    public void Outputs_bits_are_the_pinned_ones(string name, string expected)
    {
        double[] outputs = new double[Count];
        Outputs[name](new SeededNumbers(2_025), outputs);
        Assert.DoesNotContain(outputs, double.IsNaN);
        Assert.Equal(expected, Convert.ToHexStringLower(SHA256.HashData(MemoryMarshal.AsBytes<double>(outputs)))[..32]);
    }

    private static double[] Spread(SeededNumbers n, double low, double high, double farLow, double farHigh)
    {
        double[] x = n.Between(low, high, Count);
        for (int i = 0; i < Count; i += 3)
            x[i] = n.Between(farLow, farHigh);
        return x;
    }

    private static double[] AnyPositive(SeededNumbers n)
    {
        double[] x = n.Between(0.5, 2.0, Count);
        for (int i = 0; i < Count; i += 3)
            x[i] = BitConverter.UInt64BitsToDouble(n.Bits() % 0x7FF0000000000000UL);
        return x;
    }

    private static double[] Returns(SeededNumbers n)
    {
        double[] x = new double[Count];
        LogNormalMoves.LogReturns(n.Between(-8, 8, Count), 0.02, -0.0002, x);
        return x;
    }

    private static void OptionProfits(SeededNumbers n, double[] y)
    {
        double[] x = Returns(n), spot = new double[Count];
        LogNormalMoves.Spots(x, Spot0, spot);
        for (int i = 0; i < 100; i++)
        {
            var terms = new EuropeanOptionTerms(
                Spot0, n.Between(60, 160), n.Between(0.002, 3), n.Between(0.05, 0.8), n.Between(-0.01, 0.08), n.Between(-0.05, 0.05), i % 2 == 0);
            EuropeanOption.AccumulateValue(terms, x, spot, n.Between(-100, 100), EuropeanOption.Value(terms, 0, Spot0), y);
        }
    }

    private static void OptionProfitsAtOwnVolatility(SeededNumbers n, double[] y)
    {
        double[] x = Returns(n), spot = new double[Count], volatility = n.Between(0, 0.6, Count);
        LogNormalMoves.Spots(x, Spot0, spot);
        for (int i = 0; i < 30; i++)
        {
            var terms = new EuropeanOptionTerms(Spot0, n.Between(60, 160), n.Between(0.002, 3), 0.2, 0.03, 0.01, i % 2 == 0);
            EuropeanOption.AccumulateValue(terms, x, spot, volatility, n.Between(-100, 100), 1.5, y);
        }
    }

    private static void ClosedForms(SeededNumbers n, double[] y, Held one)
    {
        double[] x = Returns(n), spot = new double[Count], discount = n.Between(-0.03, 0.1, Count), carry = n.Between(-0.03, 0.08, Count), deviation = n.Between(0, 0.6, Count);
        LogNormalMoves.Spots(x, Spot0, spot);
        var market = new MarketSpans(x, spot, discount, carry, deviation);
        for (int i = 0; i < 40; i++)
            one(market.Slice(i * Count / 40, Count / 40), y.AsSpan(i * Count / 40, Count / 40));
    }

    private static void BookLosses(SeededNumbers n, double[] y)
    {
        double[] profit = n.Between(-1e4, 1e4, Count), rate = n.Between(0.5, 2, Count), total = n.Between(-1e5, 1e5, Count);
        for (int i = 0; i < 10; i++)
            BookProfit.AddLinear(n.Between(60, 160, Count), Spot0, n.Between(-500, 500), profit);
        BookProfit.AddConverted(profit, n.Between(-1e6, 1e6), rate, 1.1, total);
        BookProfit.LossInCurrency(total, n.Between(1e5, 1e6), rate, 1.1, y);
    }

    private static void Polynomials(SeededNumbers n, double[] y)
    {
        double[] z = n.Between(-1, 1, Count), w = n.Between(-1, 1, Count);
        PolynomialSum.Add(n.Between(-50, 50, 17), z, y);
        PolynomialSum.Add(n.Between(-50, 50, 11 * 6), 6, z, w, y);
    }

    private static void Branches(SeededNumbers n, double[] y)
    {
        double[] at = n.Between(-2, 2, Count);
        Branch.From(at, 0.5, n.Between(-50, 50, Count), y);
        Branch.ExerciseBelow(at, -1, n.Between(60, 160, Count), 97.3, -1, y);
    }

    private static void CrossRates(SeededNumbers n, double[] y)
    {
        Elementwise.Negate(n.Between(0.5, 2, Count), y);
        Elementwise.DivideBy(n.Between(0.5, 2, Count), y);
        Elementwise.Subtract(n.Between(-1, 1, Count), y);
        Elementwise.Add(n.Between(-100, 100, Count), y);
    }

    private static void ScaledProducts(SeededNumbers n, double[] y)
    {
        Elementwise.Product(n.Between(0.1, 9, Count), n.Between(0.1, 9, Count), y);
        Elementwise.Scale(y, 0.3162, y);
        Elementwise.AddSquare(n.Between(-3, 3, Count), 0.7, y);
        Elementwise.SquareRoot(y, y);
    }

    private static void Jumps(SeededNumbers n, double[] y)
    {
        n.Between(-0.1, 0.1, Count).CopyTo(y, 0);
        double[] Counts() => Array.ConvertAll(n.Between(0, 4, Count), Math.Floor);
        CompoundJump.Add(Counts(), Counts(), n.Between(-5, 5, Count), new(-0.05, 0.0004, 0.01, 0.0025), y);
    }

    private static void Sums(double[] values, double[] y)
    {
        for (int i = 0; i < Count; i++)
            y[i] = i % 2 == 0 ? LaneSum.Of(values.AsSpan(i % 300, i % 257)) : LaneSum.OfSquares(values.AsSpan(i % 300, i % 257));
    }
}
