using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class NormalDensityTests : UnaryKernelTests<NormalDensity>
{
    protected override (double Low, double High)[] Ranges => [(-1, 1), (-8, 8), (-40, 40), (-39, -37), (-1e-300, 1e-300), (-1e6, 1e6)];

    protected override (double X, double Expected)[] SpecialValues =>
    [
        (0.0, 0.3989422804014327), (-0.0, 0.3989422804014327), (40.0, 0.0), (-40.0, 0.0),
        (double.PositiveInfinity, 0.0), (double.NegativeInfinity, 0.0), (double.MaxValue, 0.0),
    ];
}
