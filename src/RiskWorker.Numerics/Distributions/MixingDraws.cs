using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Numerics.Distributions;

/// <summary>
/// Sums of daily mixing draws: over h days a Student-t factor moves by one normal vector times √(Σ W_k (ν-2)/ν), the sum over draws
/// k = 0 ... h - 1 of the scenario. The same daily draws serve every horizon, so a longer one continues the shorter.
/// </summary>
/// <remarks>A draw is a pure function of (stream, scenario, day): any range of scenarios gives the same bits as the whole.</remarks>
public sealed class MixingDraws
{
    /// <summary>The longest horizon in days.</summary>
    public const int MostDays = 10_000;

    private const int Strip = 256;

    private readonly MixingQuantile quantile;
    private readonly DrawStream stream;
    private readonly int[] horizons;

    /// <param name="quantile">The law of a day's draw.</param>
    /// <param name="stream">A stream of <see cref="DrawPurpose.MixingVariable"/>.</param>
    /// <param name="horizons">Days, ascending, from 1 to <see cref="MostDays"/>; at least one.</param>
    /// <exception cref="ArgumentException">The stream has another purpose, or the horizons are none or not ascending.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A horizon lies outside its range.</exception>
    public MixingDraws(MixingQuantile quantile, DrawStream stream, ReadOnlySpan<int> horizons)
    {
        ArgumentNullException.ThrowIfNull(quantile);
        if (stream.Purpose != DrawPurpose.MixingVariable)
            throw new ArgumentException($"The stream is one of {stream.Purpose}; it must be one of {DrawPurpose.MixingVariable}.", nameof(stream));
        if (horizons.IsEmpty)
            throw new ArgumentException("There are no horizons; there must be at least one.", nameof(horizons));
        for (int i = 0; i < horizons.Length; i++)
        {
            if (horizons[i] is < 1 or > MostDays)
                throw new ArgumentOutOfRangeException(nameof(horizons), horizons[i], $"Horizon {i} has {horizons[i]} days; it must have 1 to {MostDays}.");
            if (i > 0 && horizons[i] <= horizons[i - 1])
                throw new ArgumentException($"Horizon {i} has {horizons[i]} days after {horizons[i - 1]}; horizons must ascend.", nameof(horizons));
        }

        this.quantile = quantile;
        this.stream = stream;
        this.horizons = horizons.ToArray();
    }

    /// <summary>The horizons in days, ascending.</summary>
    public ReadOnlySpan<int> Horizons => horizons;

    /// <summary>(ν-2)/ν: makes a day's variance that of the covariance.</summary>
    public double UnitVariance => (quantile.DegreesOfFreedom - 2.0) / quantile.DegreesOfFreedom;

    /// <summary>Σ W over the first <paramref name="days"/> days of one scenario, from the first day on.</summary>
    public double SumAt(ulong scenario, int days)
    {
        double sum = 0.0;
        for (int day = 0; day < days; day++)
            sum += quantile.Of(UniformDraws.At(stream, scenario, (uint)day));
        return sum;
    }

    /// <summary>√(Σ W (ν-2)/ν) over the first <paramref name="days"/> days of one scenario: what a day's correlated normals are multiplied by.</summary>
    public double MultiplierAt(ulong scenario, int days) => Math.Sqrt(UnitVariance * SumAt(scenario, days));

    /// <summary>The sums of consecutive scenarios at every horizon; allocates nothing.</summary>
    /// <param name="firstScenario">Scenario of the first element of a row.</param>
    /// <param name="sums">A row a horizon, row-major, each of as many scenarios: horizon i of scenario first + s stands at i·count + s.</param>
    /// <exception cref="ArgumentException">The length is no multiple of the number of horizons.</exception>
    [ScalarTwin(nameof(SumAt))]
    public void FillSums(ulong firstScenario, Span<double> sums)
    {
        int count = sums.Length / horizons.Length;
        if (count * horizons.Length != sums.Length)
            throw new ArgumentException($"sums has {sums.Length} elements; it must have a multiple of the {horizons.Length} horizons.", nameof(sums));
        Span<double> pair = stackalloc double[2 * Strip], total = stackalloc double[Strip];
        for (int start = 0; start < count; start += Strip)
        {
            int length = Math.Min(Strip, count - start);
            FillStrip(firstScenario + (ulong)start, sums[start..], count, pair[..(2 * length)], total[..length]);
        }
    }

    /// <summary>The multipliers √(Σ W (ν-2)/ν) of consecutive scenarios at every horizon; see <see cref="FillSums"/>.</summary>
    /// <param name="firstScenario">Scenario of the first element of a row.</param>
    /// <param name="multipliers">A row a horizon, as in <see cref="FillSums"/>.</param>
    [ScalarTwin(nameof(MultiplierAt))]
    public void FillMultipliers(ulong firstScenario, Span<double> multipliers)
    {
        FillSums(firstScenario, multipliers);
        double scale = UnitVariance;
        for (int i = 0; i < multipliers.Length; i++)
            multipliers[i] *= scale;
        Elementwise.SquareRoot(multipliers, multipliers);
    }

    private void FillStrip(ulong firstScenario, Span<double> sums, int count, Span<double> pair, Span<double> total)
    {
        int length = total.Length, row = 0, last = horizons[^1];
        total.Clear();
        for (int day = 0; day < last; day++)
        {
            if ((day & 1) == 0)
            {
                UniformDraws.FillPair(stream, firstScenario, (uint)day / 2, pair[..length], pair[length..]);
                Span<double> wanted = day + 1 < last ? pair : pair[..length];
                quantile.Of(wanted, wanted);
            }

            Elementwise.Add((day & 1) == 0 ? pair[..length] : pair[length..], total);
            if (day + 1 == horizons[row])
                total.CopyTo(sums.Slice(count * row++, length));
        }
    }
}
