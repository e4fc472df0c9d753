using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Paths;

/// <summary>factor·value + offset.</summary>
internal readonly struct Scaled(double factor, double offset) : ILaneOperation
{
    public double Of(double value, double total) => Math.FusedMultiplyAdd(factor, value, offset);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> Of(Vector512<double> value, Vector512<double> total) =>
        Vector512.FusedMultiplyAdd(Vector512.Create(factor), value, Vector512.Create(offset));
}

/// <summary>value + factor·total: the next point of a motion from the last one and a draw.</summary>
internal readonly struct ScaledSum(double factor) : ILaneOperation
{
    public double Of(double value, double total) => Math.FusedMultiplyAdd(factor, total, value);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> Of(Vector512<double> value, Vector512<double> total) =>
        Vector512.FusedMultiplyAdd(Vector512.Create(factor), total, value);
}

/// <summary>total + factor·value.</summary>
internal readonly struct WeightedSum(double factor) : ILaneOperation
{
    public double Of(double value, double total) => Math.FusedMultiplyAdd(factor, value, total);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> Of(Vector512<double> value, Vector512<double> total) =>
        Vector512.FusedMultiplyAdd(Vector512.Create(factor), value, total);
}

/// <summary>total + weight·e^(volatility·W + drift).</summary>
internal readonly struct WeightedGrowth(double volatility, double drift, double weight) : ILaneOperation
{
    public double Of(double value, double total) =>
        Math.FusedMultiplyAdd(weight, Exponential.Of(Math.FusedMultiplyAdd(volatility, value, drift)), total);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> Of(Vector512<double> value, Vector512<double> total)
    {
        Vector512<double> x = Vector512.FusedMultiplyAdd(Vector512.Create(volatility), value, Vector512.Create(drift));
        return Vector512.FusedMultiplyAdd(Vector512.Create(weight), Exponential.Of(x), total);
    }
}

/// <summary>The larger of total and volatility·W + drift.</summary>
internal readonly struct LargerLog(double volatility, double drift) : ILaneOperation
{
    public double Of(double value, double total)
    {
        double x = Math.FusedMultiplyAdd(volatility, value, drift);
        return x > total ? x : total;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> Of(Vector512<double> value, Vector512<double> total)
    {
        Vector512<double> x = Vector512.FusedMultiplyAdd(Vector512.Create(volatility), value, Vector512.Create(drift));
        return Vector512.ConditionalSelect(Vector512.GreaterThan(x, total), x, total);
    }
}

/// <summary>The positive part of slope·value + offset.</summary>
internal readonly struct Hinge(double slope, double offset) : ILaneOperation
{
    public double Of(double value, double total)
    {
        double x = Math.FusedMultiplyAdd(slope, value, offset);
        return x > 0.0 ? x : 0.0;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> Of(Vector512<double> value, Vector512<double> total)
    {
        Vector512<double> x = Vector512.FusedMultiplyAdd(Vector512.Create(slope), value, Vector512.Create(offset));
        return Vector512.ConditionalSelect(Vector512.GreaterThan(x, Vector512<double>.Zero), x, Vector512<double>.Zero);
    }
}

/// <summary>The mean of a pair, less an expectation.</summary>
internal readonly struct PairMean(double expectation) : ILaneOperation
{
    public double Of(double value, double total) => Math.FusedMultiplyAdd(0.5, value + total, -expectation);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> Of(Vector512<double> value, Vector512<double> total) =>
        Vector512.FusedMultiplyAdd(Vector512.Create(0.5), value + total, Vector512.Create(-expectation));
}
