using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Tests.Pricing.Curves;

namespace RiskWorker.Engine.Tests.Sensitivities;

public sealed class RateSensitivitiesTests
{
    private static readonly DateOnly s_today = new(2026, 11, 27);

    private static Bond BondOf(double coupon, int years, string? spread = null) =>
        new(new(coupon, coupon == 0 ? 0 : 2, DayCount.Thirty360), s_today, s_today.AddYears(years), RateTerm.From("C"), 100, spread is null ? null : RateTerm.From(spread)) { Name = "B", Currency = "EUR" };

    private static (Factor, double) Point(double years, double level, string curve = "C", FactorClass kind = FactorClass.Rate) =>
        (new($"{curve}{years}", kind, ShockKind.Normal, "EUR", curve, years), level);

    private static double Time(int half) => (s_today.AddMonths(6 * half).DayNumber - s_today.DayNumber) / 365.0;

    // Half of e^(-(y-b)t) - e^(-(y+b)t) is e^(-yt) sinh(bt).
    private static double Dv01(double coupon, int years, double yield) =>
        Enumerable.Range(1, 2 * years).Sum(k => ((coupon * 50) + (k == 2 * years ? 100 : 0)) * Math.Exp(-yield * Time(k)) * Math.Sinh(0.0001 * Time(k)));

    [Fact]
    public void Dv01_at_a_flat_curve_is_minus_the_derivative_of_price_by_yield()
    {
        var found = SensitivitiesOf.Holding([Point(5, 0.06)], (BondOf(0.09, 5), 1_000));

        found.AssertValue("ALL", "C5", SensitivityMeasure.Dv01, 1_000 * Dv01(0.09, 5, 0.06), 1e-10);
        Assert.Single(found.All);
    }

    // BND-DV1: a 9% bond of five years at par, its yield compounded twice a year. dc/dy = 1/(1 + y/2) of the continuous rate c, and a half
    // of a year is 181 to 184 of 365 days here: within 2 in 1,000.
    [Fact]
    public void Dv01_of_a_par_bond_is_the_textbook_value_of_a_basis_point()
    {
        var found = SensitivitiesOf.Holding([Point(5, 2 * Math.Log(1.045))], (BondOf(0.09, 5), 1));

        found.AssertValue("ALL", "C5", SensitivityMeasure.Dv01, RateData.Example("BND-DV1").Expected * 1.045, 2e-3);
    }

    // Between two tenors the zero rate is linear, so a point moves its neighbour's rate by its share.
    [Fact]
    public void Dv01_of_a_payment_between_two_tenors_falls_to_each_by_its_share()
    {
        var found = SensitivitiesOf.Holding([Point(1, 0.01), Point(2, 0.02), Point(5, 0.035), Point(10, 0.04)], (BondOf(0, 3), 100));
        var time = Time(6);
        var (near, far) = ((5 - time) / 3, (time - 2) / 3);
        var value = 100 * 100 * Math.Exp(-time * ((near * 0.02) + (far * 0.035)));

        found.AssertValue("ALL", "C2", SensitivityMeasure.Dv01, value * Math.Sinh(near * time * 0.0001), 1e-10);
        found.AssertValue("ALL", "C5", SensitivityMeasure.Dv01, value * Math.Sinh(far * time * 0.0001), 1e-10);
        Assert.Equal(["C2", "C5"], found.All.Select(one => one.Factor));
    }

    [Fact]
    public void Sum_over_tenors_is_a_parallel_shift_of_the_curve()
    {
        var found = SensitivitiesOf.Holding([Point(1, 0.03), Point(2, 0.03), Point(5, 0.03), Point(10, 0.03)], (BondOf(0.04, 12), 1_000));

        Assert.Equal(["C1", "C2", "C5", "C10"], found.All.Select(one => one.Factor)); // by tenor, not by name
        Assert.Equal(1_000 * Dv01(0.04, 12, 0.03), found.All.Sum(one => one.Value), 1e-4); // but for third orders of a basis point
    }

    [Fact]
    public void Spread_over_a_curve_gives_a_cs01_as_large_as_the_dv01()
    {
        var found = SensitivitiesOf.Holding([Point(5, 0.04), Point(5, 0.02, "BANK", FactorClass.Credit)], (BondOf(0.09, 5, "BANK"), 1_000));

        found.AssertValue("ALL", "C5", SensitivityMeasure.Dv01, 1_000 * Dv01(0.09, 5, 0.06), 1e-10);
        found.AssertValue("ALL", "BANK5", SensitivityMeasure.Cs01, 1_000 * Dv01(0.09, 5, 0.06), 1e-10);
    }
}
