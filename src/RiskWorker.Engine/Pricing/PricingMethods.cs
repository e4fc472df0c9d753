using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Pricing;

/// <summary>
/// What is priced how: the one table behind the run's record, the report's method page, <c>results.json</c> and the README. Each kind has
/// one row of its own, and below it applies what the row of its family says.
/// </summary>
public static class PricingMethods
{
    /// <summary>Every row, families before their kinds, in the order of reports.</summary>
    public static IReadOnlyList<PricingMethod> All { get; } =
    [
        new("spot", "the closing price", "S", "the price itself",
            "the close is taken as tradable in any size: no bid and offer, no cost of leaving; income between two closes is not in it",
            i => i is Spot),
        new("fx", "the closing rate", "1 in its currency, converted at the fx factor", "the rate itself",
            "no interest is earned, and whoever holds the deposit does not fail",
            i => i is Cash),
        new("future", "the contract's own price", "value 0, profit the change of the price", "daily settlement",
            "interest on margin is ignored; the factor must be this contract's price: a series that is rolled jumps at every roll that adjustments.csv does not name",
            i => i is Future),
        new("forward", "rates and yields known to the expiry", "S e^(−qT) − K e^(−rT)", "absence of arbitrage: the underlying is carried to the expiry",
            "no counterparty fails; dividends on dates count as a yield; settlement_currency is not read: it is valued as paid in its own currency",
            i => i is Forward),

        new("bond, floater, swap", "zero rates of one curve a currency, continuously compounded", "amounts discounted at curve plus spread, summed exactly in every scenario", "discounted cash flows",
            "no default and no recovery; cash flows on weekends and holidays are not moved; no settlement lag and no ex-coupon period; the last tenor's rate holds beyond it; calls, puts, caps and sinking funds are not there",
            i => i is Bond or Floater or Swap),
        new("bond", "as above", "coupons and notional, dirty", "ISDA 2006, section 4.16; ICMA rule 251",
            "a spread is one number for all payments unless it names a curve, and stands for liquidity and default alike",
            i => i is Bond),
        new("floater", "as above; forward rates of one projection curve", "coupons N (P(t1)/P(t2) − 1) and the notional, dirty", "telescoping of discount factors",
            "no convexity for a fixing in another period, currency or day than the payment's; last_fixing has no date: one left standing prices the period that runs at an old rate",
            i => i is Floater),
        new("swap", "as above; forward rates of one projection curve", "leg received less leg paid", "telescoping of discount factors",
            "what is said of a floater's fixings holds here; no counterparty fails and no collateral earns interest; its value says nothing of its size, its notional does",
            i => i is Swap),

        new("option, digital, barrier, asian, lookback", "log-normal underlying; rate, yield and volatility known to the expiry (Black and Scholes 1973, Merton 1973)", "by kind, as the market of each scenario has it", "see each kind",
            "one volatility whatever the strike: no smile, so far strikes are wrong, and digitals and barriers most; no jumps; dividends on dates count as a yield; volatility moves only where a factor carries it; a curve counts by its rate at the expiry alone",
            IsOption),
        new("option, european", "as above", "closed form; error below 4e-16 of S e^(−qT) + K e^(−rT)", "Black and Scholes 1973, Merton 1973, Black 1976, Garman and Kohlhagen 1983",
            "what may be exercised early, or settles on another price than the close of its expiry, is another contract",
            i => i is Option { Style: ExerciseStyle.European }),
        new("option, american", "as above", "exercise boundary from its integral equation; error below 2e-7 K at 46 options, 3e-6 K where the rate that discounts the exercise is negative", "Kim 1990; Andersen, Lake and Offengenden 2016; Leisen and Reimer 1996",
            "a dividend is a yield: exercise on the eve of a dividend date is not seen; rates are taken as flat over the life, so that a steep curve misplaces the best time to exercise",
            i => i is Option { Style: ExerciseStyle.American }),
        new("digital", "as above", "closed form; error below 3e-16 of the payment by 1 + moneyness over σ√T", "Reiner and Rubinstein 1991",
            "the slope of the smile is missing, which is a good part of the value; close to strike and expiry a move of one price step decides all",
            i => i is Digital),
        new("barrier, continuous", "as above, rates flat over the life", "closed form", "Merton 1973; Reiner and Rubinstein 1991",
            "a touch in the past is looked for among closes only, unless knocked says when; no smile along the way to the barrier; below rT = −2 a rebate has no value, and the option is left out",
            i => i is SingleBarrier { Monitoring: Monitoring.Continuous }),
        new("barrier, daily", "as above, rates flat over the life", "closed form, the barrier moved by 0.5826 σ√Δt with Δt = 1/252 year", "Broadie, Glasserman and Kou 1997",
            "poor with the spot near the barrier: a down-out call at the money is 0.3% too low one σ√Δt away, 3% at a half, 18% on it (below 0.1% from 1.5 on); looks are evenly spaced, whatever the calendar",
            i => i is SingleBarrier { Monitoring: Monitoring.Daily }),
        new("asian, arithmetic", "as above, rates flat over the life", "16,384 pairs of exact paths, geometric average as control", "Kemna and Vorst 1990",
            "a standard error is in every value; a fixing falls at the close of its date, holiday or not; a continuous average so far is that of closes",
            i => i is Asian { Average: AverageKind.Arithmetic }),
        new("asian, geometric", "as above, rates flat over the life", "closed form; error below 6e-16 of S e^(−qT) + K e^(−rT)", "Kemna and Vorst 1990",
            "a fixing falls at the close of its date, holiday or not; a continuous average so far is that of closes",
            i => i is Asian { Average: AverageKind.Geometric }),
        new("lookback, continuous", "as above, rates flat over the life", "exact extreme of the path: its control is the payoff", "Goldman, Sosin and Gatto 1979; Conze and Viswanathan 1991",
            "the extreme so far is that of closes, so an extreme within a day is missing",
            i => i is Lookback { Monitoring: Monitoring.Continuous }),
        new("lookback, daily", "as above, rates flat over the life", "16,384 pairs of exact paths, the continuous extreme as control", "Lavenberg and Welch 1981 (controls)",
            "a standard error is in every value; Monday to Friday count as looks, holidays too",
            i => i is Lookback { Monitoring: Monitoring.Daily }),
    ];

    /// <summary>The rows that speak of a priced line in one of the books, with the number of those lines.</summary>
    public static IReadOnlyList<ValuationMethod> Held(IEnumerable<LineValue> lines, BookTree tree)
    {
        Instrument[] held = [.. lines.Where(l => l.Unpriced is null && tree.IndexOf(l.Position.Book) >= 0).Select(l => l.Instrument!)];
        return [.. All.Select(m => new ValuationMethod(m.Kind, m.Model, m.Method, m.Source, m.Caution, held.Count(m.Covers))).Where(m => m.Lines > 0)];
    }

    private static bool IsOption(Instrument instrument) => instrument is Option or Digital or SingleBarrier or Asian or Lookback;
}
