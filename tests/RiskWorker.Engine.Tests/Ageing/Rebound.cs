using RiskWorker.Domain.Instruments;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Tests.Ageing;

/// <summary>
/// The oracle of aged books: the instrument as its owner would value it on the later date, with the closes of one scenario as the past. Nothing of
/// what ages a book takes part.
/// </summary>
internal static class Rebound
{
    /// <summary>The value at the close of <paramref name="date"/> with the share at <paramref name="level"/>, after the <paramref name="closes"/> since the as-of date's.</summary>
    public static double Value(Instrument instrument, DateOnly date, double level, double rate = AgedMarket.R0, params double[] closes)
    {
        var binder = new InstrumentBinder("EUR", new AgedMarket().Snapshot().Factors, new Closes([AgedMarket.S0, .. closes]));
        Assert.Null(binder.Bind(instrument, date, out var bound));
        // Factors by name: R, S, T, U, X.
        return bound!.Value([rate, level, AgedMarket.T0, AgedMarket.T0, AgedMarket.X0]);
    }

    private sealed class Closes(double[] levels) : IPastLevels
    {
        public double On(UnderlyingKey underlying, DateOnly date, DateOnly basis)
        {
            for (var day = 0; day < levels.Length; day++)
            {
                if (AgedMarket.Close(day) == date) return levels[day];
            }
            return double.NaN;
        }

        public IEnumerable<DateOnly> Dates(DateOnly from, DateOnly to) => Enumerable.Range(0, levels.Length).Select(AgedMarket.Close).Where(d => d >= from && d <= to);
    }
}
