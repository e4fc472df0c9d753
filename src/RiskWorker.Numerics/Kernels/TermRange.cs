namespace RiskWorker.Numerics.Kernels;

/// <summary>Guards on the numbers that a kernel's terms are made of.</summary>
internal static class TermRange
{
    public static double Finite(double value, string name)
    {
        if (!double.IsFinite(value))
            throw new ArgumentOutOfRangeException(name, value, $"{name} is {value}; it must be finite.");
        return value;
    }

    public static double Positive(double value, string name)
    {
        if (Finite(value, name) <= 0.0)
            throw new ArgumentOutOfRangeException(name, value, $"{name} is {value}; it must be positive.");
        return value;
    }

    public static double NotNegative(double value, string name)
    {
        if (Finite(value, name) < 0.0)
            throw new ArgumentOutOfRangeException(name, value, $"{name} is {value}; it must be 0 or more.");
        return value;
    }
}
