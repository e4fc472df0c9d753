using System.Numerics;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>Covariance and variances of two series of doubled ranks, as whole numbers, so that a correlation is compared with a threshold without rounding.</summary>
internal readonly record struct RankMoments(BigInteger Covariance, BigInteger FirstVariance, BigInteger SecondVariance)
{
    /// <summary>Whether a series has one rank alone.</summary>
    public bool IsConstant => FirstVariance.IsZero || SecondVariance.IsZero;

    /// <summary>The correlation of the ranks.</summary>
    public double Correlation => (double)Covariance / (Math.Sqrt((double)FirstVariance) * Math.Sqrt((double)SecondVariance));

    public static RankMoments Of(long[] first, long[] second)
    {
        BigInteger sumFirst = 0, sumSecond = 0, squaresFirst = 0, squaresSecond = 0, products = 0;
        for (var t = 0; t < first.Length; t++)
        {
            sumFirst += first[t];
            sumSecond += second[t];
            squaresFirst += first[t] * first[t];
            squaresSecond += second[t] * second[t];
            products += first[t] * second[t];
        }
        return new((first.Length * products) - (sumFirst * sumSecond), (first.Length * squaresFirst) - (sumFirst * sumFirst), (first.Length * squaresSecond) - (sumSecond * sumSecond));
    }

    /// <summary>The sign of the correlation less <paramref name="numerator"/> / <paramref name="denominator"/>, both positive.</summary>
    public int CompareTo(int numerator, int denominator) => Covariance.Sign <= 0
        ? -1
        : (Covariance * Covariance * denominator * denominator).CompareTo(FirstVariance * SecondVariance * numerator * numerator);
}
