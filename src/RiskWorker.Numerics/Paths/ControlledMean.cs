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
        // The factor of the controls' covariance, one row a control; its last row is the variable's own.
        double[] factor = new double[(controls + 1) * controls];
        double mean = sum / count, unexplained = squares - (sum * mean);
        for (int i = 0; i <= controls; i++)
        {
            for (int j = 0; j < Math.Min(i + 1, controls); j++)
            {
                double rest = i == controls ? Covariance(crossSums[j], j, sum) : Covariance(squareSums[(i * controls) + j], j, controlSums[i]);
                for (int k = 0; k < j; k++)
                    rest = Math.FusedMultiplyAdd(-factor[(i * controls) + k], factor[(j * controls) + k], rest);
                double pivot = factor[(j * controls) + j];
                if (i == j)
                    factor[(i * controls) + i] = rest > SmallestShare * Covariance(squareSums[(i * controls) + i], i, controlSums[i]) ? Math.Sqrt(rest) : 0.0;
                else
                    factor[(i * controls) + j] = pivot > 0.0 ? rest / pivot : 0.0;
            }
        }

        // Forward: each control's own part of its mean, and of the variable.
        Span<double> own = stackalloc double[controls];
        int last = controls * controls, used = 0;
        for (int i = 0; i < controls; i++)
        {
            double pivot = factor[(i * controls) + i], rest = controlSums[i] / count;
            if (pivot == 0.0)
                continue;
            for (int k = 0; k < i; k++)
                rest = Math.FusedMultiplyAdd(-factor[(i * controls) + k], own[k], rest);
            own[i] = rest / pivot;
            mean = Math.FusedMultiplyAdd(-factor[last + i], own[i], mean);
            unexplained = Math.FusedMultiplyAdd(-factor[last + i], factor[last + i], unexplained);
            used++;
        }

        return (mean, Math.Sqrt(Math.Max(unexplained, 0.0) / ((count - used - 1.0) * count)));
    }

    private double Covariance(double products, int control, double otherSum) =>
        Math.FusedMultiplyAdd(-controlSums[control] / count, otherSum, products);
}
