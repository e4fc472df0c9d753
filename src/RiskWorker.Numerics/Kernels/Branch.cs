using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>Puts together a function that is another one on each side of a point. Elementwise; a NaN to be tested leaves the value; allocates nothing.</summary>
public static class Branch
{
    /// <summary><paramref name="other"/> where <paramref name="at"/> reaches the edge, else <paramref name="value"/>.</summary>
    public static double From(double at, double edge, double other, double value) => at >= edge ? other : value;

    /// <summary>sign·(spot - strike) where <paramref name="at"/> is below <paramref name="edge"/>, else <paramref name="value"/>.</summary>
    public static double ExerciseBelow(double at, double edge, double spot, double strike, double sign, double value) =>
        at < edge ? sign * (spot - strike) : value;

    /// <summary>value[s] = other[s] where at[s] reaches the edge.</summary>
    /// <param name="at">What is tested.</param>
    /// <param name="edge">Where the other function begins.</param>
    /// <param name="other">Its values, as long as <paramref name="at"/>.</param>
    /// <param name="value">As long as <paramref name="at"/>.</param>
    [ScalarTwin(nameof(From))]
    public static void From(ReadOnlySpan<double> at, double edge, ReadOnlySpan<double> other, Span<double> value)
    {
        Spans.RequireLength(at.Length, other.Length, nameof(other));
        Spans.RequireLength(at.Length, value.Length, nameof(value));
        ref double tested = ref MemoryMarshal.GetReference(at);
        ref double others = ref MemoryMarshal.GetReference(other);
        ref double to = ref MemoryMarshal.GetReference(value);
        Vector512<double> edges = Vector512.Create(edge);
        nuint s = 0, length = (nuint)at.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> reached = Vector512.GreaterThanOrEqual(Vector512.LoadUnsafe(ref tested, s), edges);
            Vector512.ConditionalSelect(reached, Vector512.LoadUnsafe(ref others, s), Vector512.LoadUnsafe(ref to, s)).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < at.Length; i++)
            value[i] = From(at[i], edge, other[i], value[i]);
    }

    /// <summary>value[s] = sign·(spot[s] - strike) where at[s] is below the edge.</summary>
    /// <param name="at">What is tested.</param>
    /// <param name="edge">Where exercise ends.</param>
    /// <param name="spot">Levels of the underlying, as long as <paramref name="at"/>.</param>
    /// <param name="strike">What is paid or received for one.</param>
    /// <param name="sign">1 for a call, -1 for a put.</param>
    /// <param name="value">As long as <paramref name="at"/>.</param>
    [ScalarTwin(nameof(ExerciseBelow))]
    public static void ExerciseBelow(ReadOnlySpan<double> at, double edge, ReadOnlySpan<double> spot, double strike, double sign, Span<double> value)
    {
        Spans.RequireLength(at.Length, spot.Length, nameof(spot));
        Spans.RequireLength(at.Length, value.Length, nameof(value));
        ref double tested = ref MemoryMarshal.GetReference(at);
        ref double levels = ref MemoryMarshal.GetReference(spot);
        ref double to = ref MemoryMarshal.GetReference(value);
        Vector512<double> edges = Vector512.Create(edge), strikes = Vector512.Create(strike), signs = Vector512.Create(sign);
        nuint s = 0, length = (nuint)at.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> exercised = Vector512.LessThan(Vector512.LoadUnsafe(ref tested, s), edges);
            Vector512<double> payoff = signs * (Vector512.LoadUnsafe(ref levels, s) - strikes);
            Vector512.ConditionalSelect(exercised, payoff, Vector512.LoadUnsafe(ref to, s)).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < at.Length; i++)
            value[i] = ExerciseBelow(at[i], edge, spot[i], strike, sign, value[i]);
    }
}
