using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class LogarithmTests : UnaryKernelTests<Logarithm>
{
    protected override (double Low, double High)[] Ranges =>
        [(0.5, 2.0), (0.99, 1.01), (0.0, 1e-307), (0.0, 1e-320), (1e-10, 1e10), (0.0, 1.7e308), (-1.0, 0.0)];

    protected override (double X, double Expected)[] SpecialValues =>
    [
        (1.0, 0.0), (2.0, 0.6931471805599453), (0.5, -0.6931471805599453), (0.0, double.NegativeInfinity),
        (-0.0, double.NegativeInfinity), (-double.Epsilon, double.NaN), (-1.0, double.NaN),
        (double.NegativeInfinity, double.NaN), (double.PositiveInfinity, double.PositiveInfinity),
        (double.Epsilon, -744.4400719213812), (double.MaxValue, 709.782712893384),
    ];
}
