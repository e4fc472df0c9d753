namespace RiskWorker.Numerics.Kernels;

/// <summary>Guards on the lengths and overlap of a kernel's spans.</summary>
internal static class Spans
{
    public static void RequireLength(int expected, int actual, string name)
    {
        if (actual != expected)
            throw new ArgumentException($"{name} has {actual} elements; it must have {expected}.", name);
    }

    public static void RequireRoom(int needed, int actual, string name)
    {
        if (actual < needed)
            throw new ArgumentException($"{name} has {actual} elements; it must have at least {needed}.", name);
    }

    public static void RequireSameOrApart(ReadOnlySpan<double> source, ReadOnlySpan<double> destination, string name)
    {
        if (source.Overlaps(destination, out int offset) && offset != 0)
            throw new ArgumentException($"{name} overlaps its source at offset {offset}; it must be the same memory or apart.", name);
    }
}
