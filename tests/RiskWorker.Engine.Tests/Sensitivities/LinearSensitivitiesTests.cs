using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Sensitivities;

public sealed class LinearSensitivitiesTests
{
    private const double Rounding = 1e-12;

    [Fact]
    public void Delta_of_linear_positions_is_units_times_price_times_one_percent()
    {
        var found = SensitivitiesOf.Book(MixedBook.Holding(new("EUROPE", "EQ-UNIT", 55), new("EUROPE", "OIL-FUTURE", -12), new("EUROPE", "STILL-UNIT", 5)).Build());

        found.AssertValue("EUROPE", "EQ", SensitivityMeasure.Delta, 55 * 100 * 0.01, Rounding);
        found.AssertValue("EUROPE", "OIL", SensitivityMeasure.Delta, -12 * 10 * 70 * 0.01, Rounding);
        found.AssertValue("EUROPE", "STILL", SensitivityMeasure.Delta, 5 * 20 * 0.01, Rounding); // its variance is zero, its price can move all the same
        Assert.Equal(6, found.All.Count); // three in EUROPE, three in ALL
        Assert.All(found.All, one => Assert.Equal(0.0, one.Gamma));
    }

    [Fact]
    public void Forward_at_flat_rates_is_discounted_units_of_its_underlying()
    {
        var found = SensitivitiesOf.Book(MixedBook.Holding(new Domain.Books.Position("EUROPE", "EQ-FORWARD", 25)).Build());

        found.AssertValue("EUROPE", "EQ", SensitivityMeasure.Delta, 25 * 100 * Math.Exp(-0.01 * 180 / 365) * 0.01, Rounding);
    }

    // A book in another currency: its own figures know nothing of that currency's price, its parent's hold the translation.
    [Fact]
    public void Position_in_another_currency_is_translated_and_gives_a_delta_of_the_exchange_rate()
    {
        var found = SensitivitiesOf.Book(MixedBook.Holding(new Domain.Books.Position("AMERICA", "EQU-UNIT", 40)).Build());

        found.AssertValue("AMERICA", "EQU", SensitivityMeasure.Delta, 40, Rounding); // 40 · 2 · 50 USD · 1%
        Assert.Null(found.Find("AMERICA", "USD"));
        found.AssertValue("ALL", "EQU", SensitivityMeasure.Delta, 40 * 0.9, Rounding);
        found.AssertValue("ALL", "USD", SensitivityMeasure.Delta, 4_000 * 0.9 * 0.01, Rounding);
        Assert.Equal(3, found.All.Count);
    }

    // V/X is convex in X: half of 1/1.01 - 1/0.99, and 1/1.01 + 1/0.99 - 2.
    [Fact]
    public void Book_in_a_foreign_currency_is_short_of_that_currency()
    {
        var found = SensitivitiesOf.Book(MixedBook.Holding(new Domain.Books.Position("LONDON", "EQU-UNIT", -11)).Build());
        const double value = -11 * 2 * 50 * 0.9 / 1.15;

        found.AssertValue("LONDON", "EQU", SensitivityMeasure.Delta, value * 0.01, Rounding);
        found.AssertValue("LONDON", "USD", SensitivityMeasure.Delta, value * 0.01, Rounding);
        found.AssertValue("LONDON", "GBP", SensitivityMeasure.Delta, value * ((1 / 1.01) - (1 / 0.99)) / 2, Rounding);
        Assert.Equal(value * ((1 / 1.01) + (1 / 0.99) - 2), found.Find("LONDON", "GBP")!.Gamma!.Value, 1e-11 * Math.Abs(value));
    }

    [Theory]
    [InlineData(ShockKind.Lognormal, 20)]
    [InlineData(ShockKind.Normal, 20)]
    [InlineData(ShockKind.Normal, -20)] // +1% of a negative level goes down
    public void Delta_moves_the_level_by_one_percent_whatever_the_shock(ShockKind shock, double level)
    {
        var found = SensitivitiesOf.Holding([(new("X", FactorClass.Commodity, shock, "EUR"), level)], (new Future("X") { Name = "F", Currency = "EUR" }, 3));

        found.AssertValue("ALL", "X", SensitivityMeasure.Delta, 3 * level * 0.01, Rounding);
    }

    // At 0.00005 a log-normal rate cannot fall by a basis point: half its level is used, and scaled.
    [Theory]
    [InlineData(ShockKind.Normal, 0.03)]
    [InlineData(ShockKind.Normal, -0.005)]
    [InlineData(ShockKind.Lognormal, 0.03)]
    [InlineData(ShockKind.Lognormal, 0.00005)]
    public void Rate_moves_by_a_basis_point_whatever_its_level(ShockKind shock, double level)
    {
        var found = SensitivitiesOf.Holding([(new("X", FactorClass.Rate, shock, "EUR", "CURVE", 0.25), level)], (new Future("X") { Name = "F", Currency = "EUR" }, -1_000_000));

        found.AssertValue("ALL", "X", SensitivityMeasure.Dv01, 100, 1e-11);
        Assert.Equal(("CURVE", 0.25, FactorClass.Rate, (double?)null), (found.All[0].Curve, found.All[0].TenorYears, found.All[0].Class, found.All[0].Gamma));
    }

    [Fact]
    public void Offsetting_positions_leave_nothing()
    {
        var found = SensitivitiesOf.Book(MixedBook.Holding(new("AMERICA", "EQU-UNIT", 0.1), new("LONDON", "EQU-UNIT", -0.1)).Build());

        Assert.Null(found.Find("ALL", "EQU"));
        Assert.Null(found.Find("ALL", "USD"));
        Assert.NotNull(found.Find("LONDON", "EQU"));
    }

    [Fact]
    public void Book_without_positions_has_none() =>
        Assert.Empty(SensitivitiesOf.Book(MixedBook.Holding(new Domain.Books.Position("EUROPE", "EUR-CASH", 1_000)).Build()).All);

    // More factors than fit side by side.
    [Fact]
    public void Every_one_of_many_factors_has_its_own_delta()
    {
        var market = Enumerable.Range(0, 260).Select(i => (new Factor($"F{i:000}", FactorClass.Equity, ShockKind.Lognormal, "EUR"), 10.0 + i)).ToArray();
        var found = SensitivitiesOf.Holding(market, [.. market.Select((m, i) => ((Instrument)new Spot(m.Item1.Name) { Name = m.Item1.Name, Currency = "EUR" }, (double)(i + 1)))]);

        Assert.Equal(market.Select(m => m.Item1.Name), found.All.Select(one => one.Factor));
        for (var i = 0; i < market.Length; i++) found.AssertValue("ALL", market[i].Item1.Name, SensitivityMeasure.Delta, (i + 1) * (10.0 + i) * 0.01, Rounding);
    }
}
