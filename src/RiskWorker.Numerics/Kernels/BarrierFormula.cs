using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// One scenario (or eight) of a barrier option in units of w = σ√T, mirrored so that the barrier lies below: gaps are positive upwards.
/// The logarithm to the barrier is a·w, to the strike k·w; m is the drift of the logarithm, so that with D₂ = n + m and
/// D₁ = D₂ ± w the event of ending above M = n·w lower has the terms asset·Φ(D₁) and cash·Φ(D₂), and its mirror image beyond the
/// barrier the same at D - 2a, times P = (H/S)^(2μ) = e^(-2am).
/// </summary>
/// <remarks>
/// The image's weights are those of the event times e^(-2a(a-n)), 1 where M is the barrier: no power of H/S ever stands alone with a
/// tail that undoes it, since where D - 2a is positive P is 2 at most.
/// </remarks>
internal static class BarrierFormula
{
    /// <summary>asset·Φ(D₁) - cash·Φ(D₂) less its image: the discounted payoff S - K of paths that end above M and never touched.</summary>
    public static double Survivors(in BarrierState state, double n, double end, double strike, double weight, double imageWeight)
    {
        double d2 = n + state.Drift, d1 = d2 + state.Deviation, shift = 2.0 * state.Gap;
        double image2 = d2 - shift, image1 = d1 - shift;
        double value = WeightedTail.Level(state.Asset, d1) - WeightedTail.Level(state.Cash, d2)
            - WeightedTail.Level(state.ImageAsset, image1) + WeightedTail.Level(state.ImageCash, image2);
        value = WeightedTail.Add(value, end * weight, d1);
        value = WeightedTail.Add(value, -strike * weight, d2);
        value = WeightedTail.Add(value, -end * imageWeight, image1);
        return WeightedTail.Add(value, strike * imageWeight, image2);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Survivors(
        in BarrierLanes state, Vector512<double> n, Vector512<double> end, Vector512<double> strike, Vector512<double> weight, Vector512<double> imageWeight)
    {
        Vector512<double> d2 = n + state.Drift, d1 = d2 + state.Deviation, shift = Vector512.Create(2.0) * state.Gap;
        Vector512<double> image2 = d2 - shift, image1 = d1 - shift;
        Vector512<double> value = WeightedTail.Level(state.Asset, d1) - WeightedTail.Level(state.Cash, d2)
            - WeightedTail.Level(state.ImageAsset, image1) + WeightedTail.Level(state.ImageCash, image2);
        value = WeightedTail.Add(value, end * weight, d1);
        value = WeightedTail.Add(value, -strike * weight, d2);
        value = WeightedTail.Add(value, -end * imageWeight, image1);
        return WeightedTail.Add(value, strike * imageWeight, image2);
    }

    /// <summary>e^(-rT) P(never touched): what one unit paid at expiry by a knock-in that did not knock is worth.</summary>
    public static double Untouched(double gap, double drift, double discounted, double imageDiscounted, double weight)
    {
        double d = gap + drift, image = drift - gap;
        double value = WeightedTail.Level(discounted, d) - WeightedTail.Level(imageDiscounted, image);
        return WeightedTail.Add(WeightedTail.Add(value, weight, d), -weight, image);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Untouched(
        Vector512<double> gap, Vector512<double> drift, Vector512<double> discounted, Vector512<double> imageDiscounted, Vector512<double> weight)
    {
        Vector512<double> d = gap + drift, image = drift - gap;
        Vector512<double> value = WeightedTail.Level(discounted, d) - WeightedTail.Level(imageDiscounted, image);
        return WeightedTail.Add(WeightedTail.Add(value, weight, d), -weight, image);
    }
}

/// <summary>What the parts of one scenario's value share.</summary>
/// <param name="Gap">a.</param>
/// <param name="Drift">m.</param>
/// <param name="Deviation">±w, + where the barrier truly lies below.</param>
/// <param name="Asset">S e^(-qT).</param>
/// <param name="Cash">K e^(-rT).</param>
/// <param name="ImageAsset">P e^(-qT) H²/S.</param>
/// <param name="ImageCash">P K e^(-rT).</param>
internal readonly record struct BarrierState(
    double Gap, double Drift, double Deviation, double Asset, double Cash, double ImageAsset, double ImageCash);

/// <summary>Eight <see cref="BarrierState"/>s in lanes.</summary>
internal readonly struct BarrierLanes
{
    public required Vector512<double> Gap { get; init; }

    public required Vector512<double> Drift { get; init; }

    public required Vector512<double> Deviation { get; init; }

    public required Vector512<double> Asset { get; init; }

    public required Vector512<double> Cash { get; init; }

    public required Vector512<double> ImageAsset { get; init; }

    public required Vector512<double> ImageCash { get; init; }
}
