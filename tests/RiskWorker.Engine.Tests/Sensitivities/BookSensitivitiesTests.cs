using RiskWorker.Domain.Books;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Sensitivities;

public sealed class BookSensitivitiesTests
{
    private static readonly CompiledBook s_book = CompiledBook.Of(MixedBook.Whole().Build(), 1, 10);
    private static readonly SensitivitiesOf s_found = SensitivitiesOf.Plan(s_book);

    public static TheoryData<string> Factors => [.. s_book.Model.Factors.Select(f => f.Name)];

    // Every position valued twice by its own formula at moved levels, none of it through plan or lanes.
    [Theory]
    [MemberData(nameof(Factors))]
    public void Root_is_the_positions_valued_at_moved_levels(string factor)
    {
        var place = s_book.Model.Factors.ToList().FindIndex(f => f.Name == factor);
        double Profit(int direction)
        {
            double[] levels = [.. s_book.Model.Levels];
            levels[place] = s_book.Model.Factors[place].Class switch
            {
                FactorClass.Rate => levels[place] - (direction * 0.0001),
                FactorClass.Vol => levels[place] + (direction * 0.01),
                _ => levels[place] * (1 + (direction * 0.01)),
            };
            return s_book.Snapshot.Positions.Sum(p => ProfitOf(p, levels));
        }

        var (up, down) = (Profit(1), Profit(-1));
        Assert.Equal((up - down) / 2, s_found.Value("ALL", factor), 1e-9);
        if (s_book.Model.Factors[place].Class is not (FactorClass.Rate or FactorClass.Vol)) Assert.Equal(up + down, s_found.Find("ALL", factor)!.Gamma!.Value, 1e-9);
        Assert.NotEqual(0, s_found.Value("ALL", factor));
    }

    private static double ProfitOf(Position position, double[] levels)
    {
        var binder = new InstrumentBinder("EUR", s_book.Model.Factors);
        Assert.Null(binder.Bind(s_book.Snapshot.Instruments[position.Instrument], s_book.Snapshot.AsOf, out var bound));
        double[] today = [.. s_book.Model.Levels];
        double Worth(double[] at, double settled) => (bound!.Value(at) + settled) * binder.Currencies.RateOf(bound.Currency, at);
        return position.Quantity * (Worth(levels, bound!.Settled(today, levels)) - Worth(today, 0));
    }

    // In one currency, what is held in a node itself and what its children show add up.
    [Theory]
    [MemberData(nameof(Factors))]
    public void Node_is_the_sum_of_its_parts_in_one_currency(string factor)
    {
        Snapshot InEuro(params Position[] positions) => MixedBook.Holding(positions).Build() with { Books = [.. s_book.Snapshot.Books.Select(b => b with { Currency = "EUR" })] };
        var whole = SensitivitiesOf.Book(InEuro([.. s_book.Snapshot.Positions]));
        var own = SensitivitiesOf.Book(InEuro([.. s_book.Snapshot.Positions.Where(p => p.Book == "ALL")]));
        var america = SensitivitiesOf.Book(InEuro([.. s_book.Snapshot.Positions.Where(p => p.Book == "AMERICA")]));

        Assert.Equal(own.Value("ALL", factor) + whole.Value("AMERICA", factor) + whole.Value("EUROPE", factor), whole.Value("ALL", factor), 1e-9);
        Assert.Equal(america.Value("AMERICA", factor) + whole.Value("LONDON", factor), whole.Value("AMERICA", factor), 1e-9);
        Assert.Equal(s_found.Value("ALL", factor), whole.Value("ALL", factor), 1e-9);
    }

    [Fact]
    public void Factors_that_a_node_does_not_hold_are_left_out()
    {
        Assert.Equal(["EQ", "OIL", "STILL", "USD", "VOL", "RATE"], s_found.All.Where(one => one.Book == "EUROPE").Select(one => one.Factor));
        Assert.Equal(["EQU", "GBP", "USD"], s_found.All.Where(one => one.Book == "LONDON").Select(one => one.Factor));
        Assert.DoesNotContain(s_found.All, one => one.Value == 0 && one.Gamma is null or 0);
    }

    [Fact]
    public void Nodes_come_depth_first_and_each_in_the_order_of_measures()
    {
        Assert.Equal(["ALL", "AMERICA", "LONDON", "EUROPE"], s_found.All.Select(one => one.Book).Distinct());
        Assert.All(s_found.All.GroupBy(one => one.Book), book => Assert.Equal(book.OrderBy(one => one.Measure), book));
    }

    [Fact]
    public void Run_on_any_number_of_threads_holds_the_same_bits()
    {
        var results = new RunCalculator(s_book.Snapshot, 3, null, CancellationToken.None).Calculate();

        Assert.Equal(s_found.All, results.Sensitivities);
    }
}
