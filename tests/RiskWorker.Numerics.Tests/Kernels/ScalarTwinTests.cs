using System.Reflection;
using System.Runtime.Intrinsics;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>House rules of the kernels, held over every type of the two namespaces.</summary>
public sealed class ScalarTwinTests
{
    private const BindingFlags PublicStatic = BindingFlags.Public | BindingFlags.Static | BindingFlags.DeclaredOnly;

    private static readonly Type[] Types =
    [
        .. typeof(UnaryKernel).Assembly.GetTypes().Where(type =>
            type.Namespace is "RiskWorker.Numerics.Kernels" or "RiskWorker.Numerics.Random"),
    ];

    [Fact]
    public void Every_public_span_method_names_a_scalar_twin_that_exists()
    {
        int seen = 0;
        foreach (MethodInfo method in Types.Where(type => type.IsPublic).SelectMany(type => type.GetMethods(PublicStatic)).Where(WritesOrReducesSpans))
        {
            seen++;
            var named = method.GetCustomAttribute<ScalarTwinAttribute>();
            Assert.True(named is not null, $"{Name(method)} has no scalar twin.");
            Assert.True(
                method.DeclaringType!.GetMethods(PublicStatic).Any(twin => twin.Name == named.Method && twin != method && !HasVector(twin)),
                $"{Name(method)} names {named.Method}, which is no public static method without vectors.");
        }

        Assert.True(seen >= 15, $"Only {seen} span methods were found.");
    }

    [Fact]
    public void Every_vector_function_has_an_overload_on_doubles()
    {
        int seen = 0;
        foreach (MethodInfo method in Types.SelectMany(type => type.GetMethods(PublicStatic)).Where(HasDoubleVector))
        {
            seen++;
            Type[] scalars = [.. method.GetParameters().Select(parameter => parameter.ParameterType == typeof(Vector512<double>) ? typeof(double) : parameter.ParameterType)];
            Assert.True(method.DeclaringType!.GetMethod(method.Name, scalars) is not null, $"{Name(method)} has no overload on doubles.");
        }

        Assert.True(seen >= 11, $"Only {seen} vector functions were found.");
    }

    [Fact]
    public void Every_unary_kernel_is_pinned_by_its_bits()
    {
        foreach (Type kernel in Types.Where(type => type.IsValueType && typeof(IUnaryKernel).IsAssignableFrom(type)))
            Assert.Contains(kernel.Name, KernelBitsTests.Names);
    }

    [Fact]
    public void Every_kernel_that_gives_doubles_is_pinned_by_its_bits()
    {
        Type[] kernels = [.. Types.Where(type => type.GetMethods(PublicStatic).Any(GivesDoubles))];
        Assert.True(kernels.Length >= 11, $"Only {kernels.Length} kernels were found.");
        Assert.All(kernels, kernel => Assert.Contains(kernel.Name, KernelBitsTests.Names));
    }

    private static bool GivesDoubles(MethodInfo method) =>
        method.IsDefined(typeof(ScalarTwinAttribute))
        && (method.ReturnType == typeof(double) || method.GetParameters().Any(parameter => parameter.ParameterType == typeof(Span<double>)));

    private static bool WritesOrReducesSpans(MethodInfo method) =>
        method.GetParameters().Any(parameter => parameter.ParameterType.IsByRefLike)
        && !method.IsGenericMethod
        && !method.Name.EndsWith("InTurn", StringComparison.Ordinal);

    private static bool HasVector(MethodInfo method) =>
        method.ReturnType.Name.StartsWith("Vector", StringComparison.Ordinal)
        || method.GetParameters().Any(parameter => parameter.ParameterType.Name.StartsWith("Vector", StringComparison.Ordinal));

    private static bool HasDoubleVector(MethodInfo method) =>
        method.GetParameters().Any(parameter => parameter.ParameterType == typeof(Vector512<double>));

    private static string Name(MethodInfo method) => $"{method.DeclaringType!.Name}.{method.Name}";
}
