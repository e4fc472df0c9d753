using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Distributions;

public sealed class StudentTTests
{
    // Rows of the worked examples: value at risk of the plain variate, its expected shortfall, and that of unit variance. Their quantiles
    // were found to 1e-9 (those of ν = 4 and 30 against fifty digits); the next test holds more of them.
    [Fact]
    public void Measures_equal_the_worked_examples()
    {
        int seen = 0;
        foreach (string[] row in Table.Rows("student-examples.csv"))
        {
            string[] inputs = [.. row[2].Split(';').Select(part => part.Split('=')[1])];
            var student = new StudentT(Table.Number(inputs[0]));
            decimal confidence = decimal.Parse(inputs[1], System.Globalization.CultureInfo.InvariantCulture);
            double value = row[0].Split('-')[0] switch
            {
                "TVA" => student.ValueAtRisk(confidence) / student.UnitScale,
                "TES" => student.ExpectedShortfall(confidence) / student.UnitScale,
                "TESU" => student.ExpectedShortfall(confidence),
                _ => double.NaN,
            };
            Assert.InRange(value / Table.Number(row[3]), 1 - 1e-9, 1 + 1e-9);
            seen++;
        }

        Assert.Equal(24, seen);
    }

    // Of unit variance, by fifty-digit arithmetic (mpmath): the quantile as a root of the incomplete beta function, then the closed form.
    [Theory]
    [InlineData(2.5, "0.99", 2.39398409480213478, 4.06577757350527405)]
    [InlineData(3, "0.99", 2.62157601770441511, 4.04323129878141596)]
    [InlineData(5, "0.975", 1.99116412789654828, 2.72780207164167064)]
    [InlineData(10, "0.99", 2.47199055299109853, 3.00818356942359724)]
    [InlineData(30, "0.975", 1.97302263884179675, 2.39517731034857136)]
    public void Measures_equal_fifty_digit_arithmetic(double nu, string confidence, double valueAtRisk, double expectedShortfall)
    {
        var student = new StudentT(nu);
        decimal level = decimal.Parse(confidence, System.Globalization.CultureInfo.InvariantCulture);
        Assert.InRange(student.ValueAtRisk(level) / valueAtRisk, 1 - 3e-15, 1 + 3e-15);
        Assert.InRange(student.ExpectedShortfall(level) / expectedShortfall, 1 - 5e-15, 1 + 5e-15);
    }

    // Percentage points as printed (Abramowitz and Stegun, table 26.10; from memory).
    [Theory]
    [InlineData(1, 0.975, 12.706)]
    [InlineData(3, 0.995, 5.841)]
    [InlineData(10, 0.95, 1.812)]
    [InlineData(30, 0.99, 2.457)]
    [InlineData(120, 0.975, 1.980)]
    public void Quantile_gives_the_printed_percentage_points(double nu, double p, double printed) =>
        Assert.Equal(printed, Math.Round(new StudentT(nu).Quantile(p), 3), 1e-9);

    // F = ½ + arctan(x)/π at ν = 1, F = ½ + x/(2√(2 + x²)) at ν = 2.
    [Fact]
    public void Upper_of_one_and_two_degrees_is_the_closed_form()
    {
        StudentT one = new(1), two = new(2);
        foreach (double x in new SeededNumbers(1).Between(0, 20, 400))
        {
            double root = Math.Sqrt(2 + (x * x));
            Assert.Equal(0.5 - (Math.Atan(x) / Math.PI), one.Upper(x), 2e-15);
            Assert.Equal(0.5 + (Math.Atan(x) / Math.PI), one.Upper(-x), 2e-15);
            Assert.InRange(two.Upper(x) * root * (root + x), 1 - 2e-14, 1 + 2e-14);
        }
    }

    [Fact]
    public void Functions_equal_the_library_of_reference()
    {
        var numbers = new SeededNumbers(2);
        for (int i = 0; i < 300; i++)
        {
            double nu = numbers.Between(1, 200), x = numbers.Between(-6, 6), p = numbers.Between(0.001, 0.999);
            var student = new StudentT(nu);
            Assert.Equal(MathNet.Numerics.Distributions.StudentT.PDFLn(0, 1, nu, x), student.LogDensity(x), 1e-9);
            Assert.Equal(MathNet.Numerics.Distributions.StudentT.CDF(0, 1, nu, x), student.Cdf(x), 1e-9);
            Assert.Equal(MathNet.Numerics.Distributions.StudentT.InvCDF(0, 1, nu, p), student.Quantile(p), 1e-6);
        }
    }

    [Fact]
    public void Quantile_is_inverse_to_the_tail_from_1e_100_to_the_centre()
    {
        var numbers = new SeededNumbers(3);
        for (int i = 0; i < 600; i++)
        {
            double nu = i % 2 == 0 ? numbers.Between(1, 6) : numbers.Between(1, 1000), q = 0.5 * Math.Pow(10, i % 3 == 0 ? -numbers.Between(0, 99) : -numbers.Between(0, 12));
            var student = new StudentT(nu);
            Assert.InRange(student.Upper(student.UpperQuantile(q)) / q, 1 - 1e-12, 1 + 1e-12);
            BitAssert.Equal(-student.UpperQuantile(q), student.Quantile(q));
        }
    }

    [Fact]
    public void Quantile_close_to_the_median_keeps_the_digits_of_the_distance()
    {
        var student = new StudentT(4);
        const double distance = 1.0 / (1 << 30);
        Assert.InRange(student.Quantile(0.5 + distance) * student.Density(0) / distance, 1 - 1e-14, 1 + 1e-14);
        Assert.Equal(0, student.Quantile(0.5));
    }

    [Fact]
    public void Functions_of_many_degrees_approach_the_normal_ones()
    {
        var student = new StudentT(10_000);
        foreach (double x in new SeededNumbers(4).Between(-3, 3, 50))
        {
            Assert.Equal(NormalCdf.Of(x), student.Cdf(x), 5e-5);
            Assert.Equal(NormalDensity.Of(x), student.Density(x), 5e-5);
        }

        Assert.Equal(-InverseNormal.Of(0.01), student.ValueAtRisk(0.99m), 5e-4);
    }

    [Fact]
    public void Upper_is_one_less_its_mirror_falls_and_ends_in_nothing()
    {
        var student = new StudentT(2.5);
        double before = 1;
        for (double x = -30; x <= 30; x += 0.05)
        {
            double upper = student.Upper(x);
            Assert.True(upper < before);
            Assert.Equal(1 - upper, student.Upper(-x), 1e-16);
            before = upper;
        }

        Assert.Equal(0, student.Upper(double.PositiveInfinity));
        Assert.Equal(1, student.Upper(double.NegativeInfinity));
        Assert.True(double.IsNaN(student.Upper(double.NaN)));
        Assert.Equal(0.5, student.Upper(0));
    }

    // ES is the mean of VaR over the tail: ∫ VaR_u du/(1-α), by the substitution u = 1 - (1-α) s^4 that the tail's power asks for.
    [Fact]
    public void ExpectedShortfall_is_the_mean_of_the_quantiles_beyond()
    {
        var student = new StudentT(6);
        var rule = new RiskWorker.Numerics.Quadrature.GaussLegendre(128);
        double sum = 0;
        for (int i = 0; i < rule.Points.Length; i++)
            sum += rule.Weights[i] * 4 * Math.Pow(rule.Points[i], 3) * student.UnitScale * student.UpperQuantile(0.025 * Math.Pow(rule.Points[i], 4));
        Assert.InRange(student.ExpectedShortfall(0.975m) / sum, 1 - 1e-9, 1 + 1e-9);
    }

    [Fact]
    public void Arguments_outside_are_refused_by_value()
    {
        Assert.Contains("0.5", Assert.Throws<ArgumentOutOfRangeException>(() => new StudentT(0.5)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => new StudentT(double.NaN));
        var student = new StudentT(1.5);
        Assert.Contains("1.5", Assert.Throws<InvalidOperationException>(() => student.ValueAtRisk(0.99m)).Message, StringComparison.Ordinal);
        foreach (double p in new[] { 0, 1, -0.1, 1e-101, double.NaN })
            Assert.Throws<ArgumentOutOfRangeException>(() => student.UpperQuantile(p));
        Assert.Contains("1.0", Assert.Throws<ArgumentOutOfRangeException>(() => new StudentT(5).ExpectedShortfall(1.0m)).Message, StringComparison.Ordinal);
    }
}
