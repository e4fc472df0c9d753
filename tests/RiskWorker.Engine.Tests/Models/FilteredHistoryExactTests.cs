using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>
/// Filtered historical simulation of two factors against the enumeration of its paths: with 450 days of residuals there are 450 equally likely moves
/// of one day and 202,500 of two. The filter is worked out again here, by the recursion in plain sums.
/// </summary>
public sealed class FilteredHistoryExactTests
{
    private const int Days = 450;
    private const double Lambda = 0.9;

    private static readonly double[] s_values = [600_000, 400_000];
    private static readonly double[][] s_shocks = Shocks();

    // 1% of 450 days is 4.5 of them: the fifth worst is the VaR, and the sample cannot miss it but by five standard errors of its rank.
    [Fact]
    public void Var_over_one_day_is_the_fifth_worst_residual_day()
    {
        var losses = OneDay(Filters()).OrderDescending().ToArray();
        Assert.Equal(losses[4], Book(1).Measured()[0].Value, 1e-12 * losses[4]);
    }

    [Fact]
    public void Shortfall_over_one_day_is_the_mean_of_the_worst_days()
    {
        var losses = OneDay(Filters()).OrderDescending().ToArray();
        const double Weight = 0.025 * Days;
        FourErrors.Hold((losses.Take(11).Sum() + ((Weight - 11) * losses[11])) / Weight, Book(1).Measured()[1]);
    }

    // The second day's volatility is that of the path: what the first day drew decides it.
    [Fact]
    public void Measures_over_two_days_are_those_of_all_paths()
    {
        var filters = Filters();
        var losses = (from first in Enumerable.Range(0, Days) from second in Enumerable.Range(0, Days) select TwoDays(filters, first, second)).OrderDescending().ToArray();
        var (measured, n) = (Book(2).Measured(), losses.Length);
        FourErrors.Hold(losses[n - (int)Math.Ceiling(0.99 * n)], measured[0]);
        var weight = 0.025 * n;
        FourErrors.Hold((losses.Take((int)weight).Sum() + ((weight - (int)weight) * losses[(int)weight])) / weight, measured[1]);
    }

    private static HistoryBook Book(int days) => new(new() { Kind = ModelKind.FilteredHistorical, Lambda = Lambda, Window = Days }, s_shocks) { Values = s_values, Horizons = [days], Scenarios = 200_000 };

    private static IEnumerable<double> OneDay((double[] Residuals, double Next)[] filters) =>
        Enumerable.Range(0, Days).Select(t => filters.Select((f, j) => s_values[j] * (1 - Math.Exp(Math.Sqrt(f.Next) * f.Residuals[t]))).Sum());

    private static double TwoDays((double[] Residuals, double Next)[] filters, int first, int second)
    {
        var loss = 0.0;
        foreach (var (j, (residuals, next)) in filters.Index())
        {
            var move = Math.Sqrt(next) * residuals[first];
            loss += s_values[j] * (1 - Math.Exp(move + (Math.Sqrt((Lambda * next) + ((1 - Lambda) * move * move)) * residuals[second])));
        }
        return loss;
    }

    // v_1 the mean square; v_{t+1} = lambda v_t + (1 - lambda) x_t²; residuals to mean 0 and variance 1.
    private static (double[] Residuals, double Next)[] Filters() => [.. s_shocks.Select(x =>
    {
        var (variance, residuals) = (x.Average(v => v * v), new double[Days]);
        for (var t = 0; t < Days; t++)
        {
            residuals[t] = x[t] / Math.Sqrt(variance);
            variance = (Lambda * variance) + ((1 - Lambda) * x[t] * x[t]);
        }
        var mean = residuals.Average();
        var deviation = Math.Sqrt(residuals.Average(r => (r - mean) * (r - mean)));
        return (residuals.Select(r => (r - mean) / deviation).ToArray(), variance);
    })];

    private static double[][] Shocks()
    {
        var (first, second) = (HistoryBook.Normals(Days, 5), HistoryBook.Normals(Days, 6));
        return [[.. first.Select((z, t) => 0.01 * (1 + (0.5 * Math.Sin(t / 30.0))) * z)], [.. second.Select((z, t) => 0.015 * ((0.6 * first[t]) + (0.8 * z)))]];
    }
}
