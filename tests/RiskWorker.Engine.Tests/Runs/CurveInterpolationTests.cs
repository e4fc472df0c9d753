using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Runs;

public sealed class CurveInterpolationTests
{
    // 1,461 days of 365 from the valuation date, between tenors of 2 and 10 years at 1% and 3%.
    [Theory]
    [InlineData(CurveInterpolation.LinearZero)]
    [InlineData(CurveInterpolation.LogLinearDiscount)]
    public void Run_values_a_bond_between_two_tenors_as_the_settings_say(CurveInterpolation interpolation)
    {
        double[] shorter = [.. Wave(61).Select(w => (w - 90) / 1000)], longer = [.. Wave(61).Select(w => (w - 70) / 1000)];
        var bond = new Bond(new(0, 0, DayCount.ActualActual), new(2020, 1, 1), Friday.AddYears(4), RateTerm.From("EUR"), 100, null) { Name = "ZERO", Currency = "EUR" };
        var snapshot = new FridaySnapshot().Factor(new("S", FactorClass.Rate, ShockKind.Normal, "EUR", "EUR", 2)).Prices("S", shorter)
            .Factor(new("L", FactorClass.Rate, ShockKind.Normal, "EUR", "EUR", 10)).Prices("L", longer)
            .Instrument(bond).Position("FIRM", "ZERO", 3).Previous(Friday.AddDays(-1), new Domain.Books.Position("FIRM", "ZERO", 3))
            .Settings(s => s with { CurveInterpolation = interpolation, Simulation = s.Simulation with { Scenarios = 1000, Cap = 1000 } }).Build();

        var results = new RunCalculator(snapshot, 1, null, CancellationToken.None).Calculate();

        double today = Value(shorter[^1], longer[^1], 1461), before = Value(shorter[^2], longer[^2], 1462);
        Assert.Equal(3 * today, results.Nodes[0].Value, 1e-10);
        // The valuation date of the hypothetical profit stays at the day before.
        Assert.Equal(3 * (Value(shorter[^1], longer[^1], 1462) - before), Assert.Single(results.Hypothetical!.Books).Amount, 1e-10);

        double Value(double low, double high, int days)
        {
            double years = days / 365.0, weight = (years - 2) / 8;
            return 100 * Math.Exp(-(interpolation == CurveInterpolation.LinearZero ? years * (((1 - weight) * low) + (weight * high)) : ((1 - weight) * 2 * low) + (weight * 10 * high)));
        }
    }
}
