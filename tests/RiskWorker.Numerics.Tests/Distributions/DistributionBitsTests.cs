using System.Reflection;
using System.Runtime.InteropServices;
using System.Security.Cryptography;
using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Interpolation;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.LinearAlgebra;
using RiskWorker.Numerics.Optimisation;
using RiskWorker.Numerics.Random;
using RiskWorker.Numerics.Statistics;
using RiskWorker.Numerics.Tests.Statistics;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Distributions;

/// <summary>
/// The first half of SHA-256 over the bits of the Student-t model's numbers: the same on every hardware and in every setting. One that
/// changes moves the figures of stored runs and asks for a new numerics epoch.
/// </summary>
public sealed class DistributionBitsTests
{
    private static readonly double[] Degrees = [2.05, 2.7, 4, 6.5, 19.3, 200];

    [Theory]
    [InlineData("MixingQuantile", "524e5cf10ff1e26d18d24ba70ce773b7")]
    [InlineData("MixingDraws", "78ba85184ec0d3c308d0db3715bc1c56")]
    [InlineData("MarginMap", "2b57a65b04e2995cf49638a840fb1d33")]
    [InlineData("PiecewisePolynomial", "10d70756ae0b66ca28508e4d39f96a5e")]
    [InlineData("StudentT", "cc69f9a9382c4309221f2c592a8c76b8")]
    [InlineData("ChiSquare", "db28e7e1d7961528e9c023e0f3963782")]
    [InlineData("LogGamma", "e4b3066c852acd6673c17b5d3d185598")]
    [InlineData("Likelihoods", "a97a00ecefc433ed5a83ec833f681aa3")]
    public void Outputs_bits_are_the_pinned_ones(string name, string expected)
    {
        double[] outputs = Outputs(name, new SeededNumbers(2_027));
        Assert.DoesNotContain(outputs, double.IsNaN);
        Assert.Equal(expected, Convert.ToHexStringLower(SHA256.HashData(MemoryMarshal.AsBytes<double>(outputs)))[..32]);
    }

    [Fact]
    public void Every_span_method_that_writes_names_a_scalar_twin_that_exists()
    {
        int seen = 0;
        const BindingFlags own = BindingFlags.Public | BindingFlags.Instance | BindingFlags.Static | BindingFlags.DeclaredOnly;
        foreach (Type type in typeof(MixingQuantile).Assembly.GetTypes().Where(type => type.IsPublic && type.Namespace == typeof(MixingQuantile).Namespace).Append(typeof(PiecewisePolynomial)))
        {
            foreach (MethodInfo method in type.GetMethods(own).Where(method => method.GetParameters().Any(parameter => parameter.ParameterType == typeof(Span<double>))))
            {
                seen++;
                var named = method.GetCustomAttribute<ScalarTwinAttribute>();
                Assert.True(named is not null, $"{type.Name}.{method.Name} has no scalar twin.");
                Assert.Contains(type.GetMethods(own), twin => twin.Name == named.Method && twin.ReturnType == typeof(double));
            }
        }

        Assert.True(seen >= 5, $"Only {seen} span methods were found.");
    }

    private static double[] Outputs(string name, SeededNumbers n) => name switch
    {
        "MixingQuantile" => [.. Degrees.SelectMany(nu => Mixed(nu, n))],
        "MixingDraws" => Sums(),
        "MarginMap" => [.. Degrees.SelectMany(nu => Degrees.SelectMany(margin => Mapped(nu, margin, n)))],
        "PiecewisePolynomial" => Table(n),
        "StudentT" => [.. Degrees.SelectMany(nu => Student(new(nu), n))],
        "ChiSquare" => [.. Degrees.SelectMany(nu => Squares(nu, n))],
        "LogGamma" => [.. n.Between(0.01, 300, 2_000).Select(LogGamma.Of)],
        _ => Fits(),
    };

    private static double[] Mixed(double nu, SeededNumbers n)
    {
        var mixing = new MixingQuantile(nu);
        double[] w = new double[5_000];
        mixing.Of(n.Between(0, 1, w.Length), w);
        return [.. w, mixing.Cap, mixing.Mean];
    }

    private static double[] Sums()
    {
        double[] room = new double[3 * 1_000];
        new MixingDraws(new(3.9), new(7, DrawPurpose.MixingVariable, 0), [1, 10, 21]).FillMultipliers(123, room);
        return room;
    }

    private static double[] Mapped(double nu, double margin, SeededNumbers n)
    {
        double[] x = n.Between(-7, 7, 1_000), scores = new double[x.Length];
        MarginMap.OfNormalScore(margin).Of(x, scores);
        MarginMap.ToUnitVariance(nu, margin).Of(x, x);
        return [.. x, .. scores];
    }

    private static double[] Table(SeededNumbers n)
    {
        double[] y = new double[5_000];
        new PiecewisePolynomial(NormalCdf.Of, -4, 3).Of(n.Between(-5, 4, y.Length), y);
        return y;
    }

    private static IEnumerable<double> Student(StudentT student, SeededNumbers n)
    {
        for (int i = 0; i < 200; i++)
        {
            double x = n.Between(-9, 9), q = Math.ScaleB(n.Unit() + 1e-9, -(i % 40));
            yield return student.LogDensity(x);
            yield return student.Upper(x);
            yield return student.UpperQuantile(Math.Min(q, 0.999));
        }

        yield return student.ValueAtRisk(0.99m);
        yield return student.ExpectedShortfall(0.975m);
    }

    private static IEnumerable<double> Squares(double nu, SeededNumbers n)
    {
        for (int i = 0; i < 200; i++)
        {
            double x = nu * n.Between(0, 4), mass = Math.ScaleB(n.Unit() + 1e-9, -1 - (i % 40));
            yield return ChiSquare.LowerTail(nu, x);
            yield return ChiSquare.UpperTail(nu, x);
            yield return ChiSquare.LowerQuantile(nu, Math.Min(mass, 0.5));
            yield return ChiSquare.UpperQuantile(nu, Math.Min(mass, 0.5));
        }
    }

    private static double[] Fits()
    {
        const int factors = 6, days = 203;
        double[] rows = StudentShocks.Of(factors, days, 5, 0.3, 77), scores = new double[rows.Length], squares = new double[days];
        double[] weights = [.. Enumerable.Range(0, days).Select(t => 1.0 + (t / 64.0))];
        PivotedCholesky factor = PivotedCholesky.Factor(StudentShocks.Correlation(factors, 0.3), factors);
        MahalanobisDistances.Of(factor, rows, squares);
        CopulaLikelihood.NormalScores(rows, 5.5, scores);
        DegreesOfFreedomFit[] fits =
        [
            StudentLikelihood.Fit(squares, factors, weights), StudentLikelihood.FitComposite(rows, factors),
            CopulaLikelihood.Fit(scores, factor, weights), CopulaPairLikelihood.Fit(scores, factors, [new(0, 1, 0.3), new(4, 2, 0.3)]),
        ];
        return [.. squares, .. fits.SelectMany(fit => new[] { fit.Nu, fit.LogLikelihood, fit.NormalLogLikelihood, fit.IntervalLow, fit.IntervalHigh, fit.Days })];
    }
}
