using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests.Sensitivities;

/// <summary>
/// Sensitivities of options against Black and Scholes (1973), whose normal distribution is that of Marsaglia, "Evaluating the Normal
/// Distribution", Journal of Statistical Software 11 (2004), written here anew.
/// </summary>
public sealed class OptionSensitivitiesTests
{
    private const double Spot = 49, Strike = 50, Years = 140 / 365.0;

    // Hull's example of the Greek letters: S 49, K 50, r 5%, volatility 20%, 0.3846 years. A price depends on rT and on volatility times
    // the root of T alone, so 140 days at the rate and the volatility below are the same option.
    private const double HullYears = 0.3846;
    private static readonly double s_rate = 0.05 * HullYears / Years;
    private static readonly double s_volatility = 0.20 * Math.Sqrt(HullYears / Years);

    private static readonly Factor s_price = new("S", FactorClass.Equity, ShockKind.Lognormal, "EUR");
    private static readonly Factor s_vol = new("S.VOL", FactorClass.Vol, ShockKind.Lognormal);

    private static Option Call(double strike = Strike, double? rate = null)
    {
        var expiry = new DateOnly(2026, 11, 27).AddDays(140);
        return new(new("S", null), strike, expiry, OptionRight.Call, ExerciseStyle.European, new(null, "S.VOL"), RateTerm.Of(rate ?? s_rate), RateTerm.Of(0)) { Name = "C", Currency = "EUR" };
    }

    private static SensitivitiesOf Holding(double quantity) => SensitivitiesOf.Holding([(s_price, Spot), (s_vol, s_volatility)], (Call(), quantity));

    private static double Density(double x) => Math.Exp(-x * x / 2) / Math.Sqrt(2 * Math.PI);

    private static double Distribution(double x)
    {
        double sum = x, term = x, before = 0;
        for (var i = 3; sum != before; i += 2) (before, term, sum) = (sum, term * x * x / i, sum + (term * x * x / i));
        return 0.5 + (sum * Density(x));
    }

    private static double D1(double spot, double volatility) => ((Math.Log(spot / Strike) + ((s_rate + (volatility * volatility / 2)) * Years)) / (volatility * Math.Sqrt(Years)));

    private static double Price(double spot, double volatility)
    {
        var d1 = D1(spot, volatility);
        return (spot * Distribution(d1)) - (Strike * Math.Exp(-s_rate * Years) * Distribution(d1 - (volatility * Math.Sqrt(Years))));
    }

    // GRK-01 and GRK-02 (Hull, Options, Futures, and Other Derivatives, chapter on the Greek letters), recomputed to 16 digits; he prints 2.4 and 0.522.
    [Fact]
    public void Formula_of_this_test_gives_the_published_price_and_delta()
    {
        Assert.Equal(2.4004610869656666, Price(Spot, s_volatility), 1e-13);
        Assert.Equal(0.5216016339715761, Distribution(D1(Spot, s_volatility)), 1e-13);
    }

    [Fact]
    public void Differences_are_those_of_the_formula()
    {
        var found = Holding(1_000);
        var (down, still, up) = (Price(Spot * 0.99, s_volatility), Price(Spot, s_volatility), Price(Spot * 1.01, s_volatility));

        found.AssertValue("ALL", "S", SensitivityMeasure.Delta, 1_000 * (up - down) / 2, 1e-12);
        Assert.Equal(1_000 * (up + down - (2 * still)), found.Find("ALL", "S")!.Gamma!.Value, 1e-9);
        found.AssertValue("ALL", "S.VOL", SensitivityMeasure.Vega, 1_000 * (Price(Spot, s_volatility + 0.01) - Price(Spot, s_volatility - 0.01)) / 2, 1e-12);
    }

    // A central difference is off by a third derivative times h²/6 (gamma by a fourth times h²/12); Γ' = -Γ/S (d1/(σ√T) + 1).
    [Fact]
    public void Delta_gamma_and_vega_are_the_greeks_of_the_textbook_times_the_move()
    {
        var found = Holding(1);
        var (h, root) = (Spot * 0.01, s_volatility * Math.Sqrt(Years));
        var d1 = D1(Spot, s_volatility);
        var gamma = Density(d1) / (Spot * root);
        var third = -gamma / Spot * ((d1 / root) + 1);

        Assert.Equal(0.066, gamma, 5e-4); // Hull prints 0.066
        Assert.Equal(0.5216016339715761, (found.Value("ALL", "S") / h) - (h * h / 6 * third), 2e-7);
        Assert.Equal(gamma * h * h, found.Find("ALL", "S")!.Gamma!.Value, 0.005 * gamma * h * h);
        var vega = Spot * Math.Sqrt(Years) * Density(d1);
        Assert.Equal(12.1, vega * Math.Sqrt(HullYears / Years), 0.05); // Hull prints 12.1 for a year's volatility at 0.3846 years
        Assert.Equal(vega * 0.01, found.Value("ALL", "S.VOL"), 1e-4 * vega * 0.01);
    }

    [Fact]
    public void Short_option_has_the_opposite_of_a_long_one()
    {
        var (held, sold) = (Holding(7), Holding(-7));

        Assert.Equal(held.All.Select(one => (one.Factor, -one.Value, -one.Gamma)), sold.All.Select(one => (one.Factor, one.Value, one.Gamma)));
        Assert.True(held.Find("ALL", "S") is { Value: > 0, Gamma: > 0 });
    }

    // At the money forward, price is S (2 Φ(σ√T/2) - 1): all but linear in a small σ, which cannot fall by 0.01 from 0.008.
    [Fact]
    public void Vega_of_a_volatility_below_the_move_is_scaled_from_a_smaller_one()
    {
        var found = SensitivitiesOf.Holding([(s_price, Spot), (s_vol, 0.008)], (Call(Spot, 0), 1));

        found.AssertValue("ALL", "S.VOL", SensitivityMeasure.Vega, Spot * Math.Sqrt(Years) * Density(0.004 * Math.Sqrt(Years)) * 0.01, 1e-5);
    }
}
