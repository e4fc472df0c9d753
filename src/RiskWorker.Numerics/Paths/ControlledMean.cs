using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Paths;

/// <summary>
/// The mean of a variable with the help of controls of expectation 0: the constant of the least-squares regression on them
/// (Lavenberg and Welch 1981), from sums that are added in one order. Two variables that differ by a linear combination of
/// the controls differ by exactly its expectation.
/// </summary>
internal sealed class ControlledMean(int controls)
{
    // A control of which less than this share of the variance is its own says nothing that the others have not said.
    private const double SmallestShare = 1e-10;

    // Of a control that varies less than this about another mean than 0 only rounding is left.
    private const double SmallestSpread = 1e-2;

    private readonly double[] controlSums = new double[controls];
    private readonly double[] crossSums = new double[controls];
    private readonly double[] squareSums = new double[controls * controls];
    private double count;
    private double sum;
    private double squares;

    /// <summary>Adds a block: the variable, and its controls row after row.</summary>
    public void Add(ReadOnlySpan<double> values, ReadOnlySpan<double> controlRows)
    {
        int length = values.Length;
        count += length;
        sum += LaneSum.Of(values);
        squares += LaneSum.OfSquares(values);
        for (int i = 0; i < controls; i++)
        {
            ReadOnlySpan<double> row = controlRows.Slice(i * length, length);
            controlSums[i] += LaneSum.Of(row);
            crossSums[i] += LaneLoop.Dot(row, values);
            for (int j = 0; j <= i; j++)
                squareSums[(i * controls) + j] += LaneLoop.Dot(row, controlRows.Slice(j * length, length));
        }
    }

    /// <summary>The mean and its standard error.</summary>
    public (double Mean, double StandardError) Result()
    {
        double[] factor = Factor();
        double mean = sum / count, unexplained = squares - (sum * mean);
        Span<double> own = stackalloc double[controls];
        int used = 0;
        for (int i = 0; i < controls; i++)
        {
            double pivot = factor[(i * controls) + i], loading = factor[(controls * controls) + i];
            if (pivot == 0.0)
                continue;
            own[i] = Rest(controlSums[i] / count, factor.AsSpan(i * controls, i), own) / pivot;
            mean = Math.FusedMultiplyAdd(-loading, own[i], mean);
            unexplained = Math.FusedMultiplyAdd(-loading, loading, unexplained);
            used++;
        }

        return (mean, Math.Sqrt(Math.Max(unexplained, 0.0) / ((count - used - 1.0) * count)));
    }

    /// <summary>
    /// The lower factor of the controls' covariance, times the count, and below it the variable's covariance with each control's
    /// own part. The pivot of a control that says nothing of its own is 0.
    /// </summary>
    private double[] Factor()
    {
        double[] factor = new double[(controls + 1) * controls];
        for (int i = 0; i <= controls; i++)
        {
            Span<double> row = factor.AsSpan(i * controls, controls);
            for (int j = 0; j < controls && j <= i; j++)
            {
                double whole = i == controls ? Covariance(crossSums[j], j, sum) : Covariance(squareSums[(i * controls) + j], j, controlSums[i]);
                double rest = Rest(whole, row[..j], factor.AsSpan(j * controls, j)), pivot = factor[(j * controls) + j];
                if (i == j)
                    row[j] = rest > SmallestShare * Math.Max(whole, SmallestSpread * squareSums[(i * controls) + i]) ? Math.Sqrt(rest) : 0.0;
                else
                    row[j] = pivot > 0.0 ? rest / pivot : 0.0;
            }
        }

        return factor;
    }

    /// <summary>whole - a·b over the length of <paramref name="a"/>.</summary>
    private static double Rest(double whole, ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        for (int k = 0; k < a.Length; k++)
            whole = Math.FusedMultiplyAdd(-a[k], b[k], whole);
        return whole;
    }

    private double Covariance(double products, int control, double otherSum) =>
        Math.FusedMultiplyAdd(-controlSums[control] / count, otherSum, products);
}
