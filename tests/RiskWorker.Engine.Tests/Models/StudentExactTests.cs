using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Distributions;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>
/// Student-t books with given degrees of freedom, from snapshot to VaR and ES, within four standard errors of exact values: quantiles of
/// <see cref="StudentT"/> (its own tests hold it to fifty digits), and Data/models/exact.csv by SciPy. The cut of the mixing variable, at 1e-7,
/// moves none of them by a hundredth of an error.
/// </summary>
public sealed class StudentExactTests
{
    private const double Value = 1_000_000;

    /// <summary>Loss of a long position V(1 - e^x), x = m - s q: VaR = V(1 - exp(m - s q)), q the quantile of unit variance, m = (mu - sigma²/2) of a day.</summary>
    [Theory]
    [InlineData(2.5, 0.0)]
    [InlineData(4, 0.08)]
    [InlineData(30, -0.1)]
    public void Long_position_over_a_day_meets_the_closed_form_of_var(double nu, double mu)
    {
        var s = 0.25 / Math.Sqrt(252);
        FourErrors.Hold(Value * (1 - Math.Exp((mu / 252) - (s * s / 2) - (s * new StudentT(nu).ValueAtRisk(0.99m)))), Book(nu, mu, 1).Measured().Var);
    }

    /// <summary>A future on a factor of normal shocks loses -s t outright: VaR and ES are those of t itself (McNeil, Frey and Embrechts 2015, example 2.15).</summary>
    [Theory]
    [InlineData(4.5)]
    [InlineData(7.5)]
    public void Factor_of_normal_shocks_over_a_day_meets_var_and_shortfall_of_t(double nu)
    {
        var (var, es) = (Book(nu, 0, 1) with { Shock = Domain.Market.ShockKind.Normal }).Measured();
        var (law, s) = (new StudentT(nu), Value * 0.25 / Math.Sqrt(252));
        FourErrors.Hold(s * law.ValueAtRisk(0.99m), var);
        FourErrors.Hold(s * law.ExpectedShortfall(0.975m), es);
    }

    // Over ten days: ten independent t variates added, by the tenth power of the characteristic function.
    [Theory]
    [InlineData("T-3-1-long", 3, 0.0, 1)]
    [InlineData("T-4-1-long", 4, 0.08, 1)]
    [InlineData("T-6.5-1-long", 6.5, 0.08, 1)]
    [InlineData("T-3-10-long", 3, 0.0, 10)]
    [InlineData("T-4-10-long", 4, 0.08, 10)]
    [InlineData("T-6.5-10-long", 6.5, 0.0, 10)]
    public void Long_position_meets_the_inverted_characteristic_function(string name, double nu, double mu, int days)
    {
        var (exact, (var, es)) = (ExactValues.Of(name), Book(nu, mu, days).Measured());
        FourErrors.Hold(Value * exact.Var, var);
        FourErrors.Hold(Value * exact.Es!.Value, es);
    }

    // A short position's shortfall hangs on the cut; its VaR does not.
    [Theory]
    [InlineData("T-4-1-short", 1)]
    [InlineData("T-4-10-short", 10)]
    public void Short_position_meets_the_inverted_characteristic_function_of_var(string name, int days) =>
        FourErrors.Hold(Value * ExactValues.Of(name).Var, (Book(4, 0.08, days) with { Values = [-Value] }).Measured().Var);

    // The exponential of ten days' added shocks is far from the ten-day t of one draw: the days are drawn one by one.
    [Fact]
    public void Ten_days_of_a_heavy_tail_are_no_scaled_day()
    {
        var s = 0.25 / Math.Sqrt(25.2);
        var scaled = 1 - Math.Exp((-s * s / 2) - (s * new StudentT(3).ValueAtRisk(0.99m)));
        var measured = Book(3, 0, 10).Measured().Var;
        Assert.True(Value * scaled > measured.High + (2 * (measured.High - measured.Low)), $"{measured.Value:r} against {Value * scaled:r}");
    }

    [Theory]
    [InlineData("T2-4-0.5", 4, 0.5)]
    [InlineData("T2-3--0.3", 3, -0.3)]
    [InlineData("T2-8-0.9", 8, 0.9)]
    public void Two_correlated_positions_meet_the_quadrature(string name, double nu, double correlation)
    {
        var book = Book(nu, 0, 1) with { Volatilities = [0.25, 0.4], Values = [600_000, 400_000], Correlation = correlation };
        var (exact, (var, es)) = (ExactValues.Of(name), book.Measured());
        FourErrors.Hold(exact.Var, var);
        FourErrors.Hold(exact.Es!.Value, es);
    }

    private static SpotBook Book(double nu, double mu, int days) => new(
        new() { Kind = ModelKind.StudentT, DegreesOfFreedom = nu, Drift = DriftKind.Explicit, Drifts = new Dictionary<string, double> { ["X"] = mu } }, days);
}
