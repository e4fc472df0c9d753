using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class ExponentialTests : UnaryKernelTests<Exponential>
{
    protected override (double Low, double High)[] Ranges =>
        [(-1, 1), (-0.35, 0.35), (-708, 709), (-746, -707), (709, 711), (-1e-300, 1e-300), (-2000, 2000)];

    // The overflow and underflow thresholds are those of the nearest double: ln of the largest double and of half the smallest.
    protected override (double X, double Expected)[] SpecialValues =>
    [
        (0.0, 1.0), (-0.0, 1.0), (1.0, Math.E), (5e-324, 1.0), (-5e-324, 1.0),
        (double.PositiveInfinity, double.PositiveInfinity), (double.NegativeInfinity, 0.0),
        (709.7827128933841, double.PositiveInfinity), (double.MaxValue, double.PositiveInfinity),
        (-745.1332191019412, 0.0), (-745.1332191019411, double.Epsilon), (double.MinValue, 0.0),
    ];
}
