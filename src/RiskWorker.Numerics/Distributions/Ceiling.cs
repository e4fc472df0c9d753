using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Distributions;

/// <summary>Cuts numbers from above; a NaN stays one.</summary>
internal static class Ceiling
{
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Apply(double highest, Span<double> values)
    {
        ref double at = ref MemoryMarshal.GetReference(values);
        Vector512<double> ceiling = Vector512.Create(highest);
        nuint s = 0, length = (nuint)values.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> eight = Vector512.LoadUnsafe(ref at, s);
            Vector512.ConditionalSelect(Vector512.GreaterThan(eight, ceiling), ceiling, eight).StoreUnsafe(ref at, s);
        }

        for (; s < length; s++)
        {
            ref double one = ref Unsafe.Add(ref at, s);
            one = one > highest ? highest : one;
        }
    }
}
