using RiskWorker.Domain.Instruments;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Pricing;

public sealed class BoundInstrumentTests
{
    private static readonly CompiledBook s_book = CompiledBook.Of(MixedBook.Whole().Build(), 1);
    private static readonly InstrumentBinder s_binder = new("EUR", s_book.Model.Factors);
    private static double[] Levels => [.. s_book.Model.Levels];

    private static BoundInstrument Bound(Instrument instrument, int days = 0)
    {
        Assert.Null(s_binder.Bind(instrument, MixedBook.AsOf.AddDays(days), out var bound));
        return bound!;
    }

    private static double ValueOf(Instrument instrument) => Bound(instrument).Value(Levels);

    public static TheoryData<string> OptionNames => [.. MixedBook.Instruments.OfType<Option>().Select(o => o.Name)];

    // C - P = S e^(-qT) - K e^(-rT): two options against the forward of the same terms. Each value is within 4e-16 of the levels it
    // is the difference of, as the kernel states; the forward rounds as often.
    [Theory]
    [MemberData(nameof(OptionNames))]
    public void Call_less_put_is_the_forward(string name)
    {
        var option = (Option)s_book.Snapshot.Instruments[name];
        var forward = new Forward(option.Underlying, option.Strike, option.Expiry, option.Curve, option.Carry, null) { Name = "F", Currency = option.Currency };
        var spot = ((BoundEuropean)Bound(option)).Underlying.LevelOf(Levels);
        Assert.Equal(ValueOf(forward), ValueOf(option with { Right = OptionRight.Call }) - ValueOf(option with { Right = OptionRight.Put }), 12e-16 * (spot + option.Strike));
    }

    [Fact]
    public void Option_on_its_last_day_is_worth_what_exercise_brings()
    {
        var option = (Option)s_book.Snapshot.Instruments["EQ-LAST-DAY"];
        Assert.Equal(3.0, ValueOf(option with { Strike = 97 }));
        Assert.Equal(0.0, ValueOf(option with { Strike = 103 }));
        Assert.Equal(6.0, ValueOf(option with { Strike = 103, Right = OptionRight.Put, Multiplier = 2 }));
    }

    [Fact]
    public void Future_has_no_value_an_exposure_of_its_price_and_the_change_of_it_as_profit()
    {
        var future = Bound(s_book.Snapshot.Instruments["OIL-FUTURE"]);
        var after = Levels;
        after[3] = 71.5; // EQ, EQU, GBP, OIL: ordinal order
        Assert.Equal(0, future.Value(Levels));
        Assert.Equal(700, future.Exposure(Levels));
        Assert.Equal(15, future.Settled(Levels, after));
    }

    [Fact]
    public void Option_bound_a_day_later_has_lost_that_day()
    {
        var option = s_book.Snapshot.Instruments["EQ-CALL"];
        var decay = Bound(option, days: 1).Value(Levels) - Bound(option).Value(Levels);
        Assert.InRange(decay, -0.05, -0.01); // some 26 volatility points of a year's 365 days on 100
    }

    public static TheoryData<string> Priced => [.. MixedBook.Instruments.Where(i => i is not Cash and not Future).Select(i => i.Name)];

    [Theory]
    [MemberData(nameof(Priced))]
    public void Missing_level_makes_the_value_NaN(string name) =>
        Assert.Equal(double.NaN, Bound(s_book.Snapshot.Instruments[name]).Value([.. Levels.Select(_ => double.NaN)]));
}
