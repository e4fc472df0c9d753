namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Names the method of the same type that does a vector method's operations in the same order on plain doubles.
/// The two give the same bits; a test holds every span method of the kernels to that.
/// </summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class ScalarTwinAttribute(string method) : Attribute
{
    /// <summary>Name of the twin, a public static method without span or vector where an element stands alone.</summary>
    public string Method { get; } = method;
}
