using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// The three rational functions of Wichura's AS 241 (PPND16), numerator over denominator, each of degree 7:
/// <c>Center</c> of 0.180625 - q², <c>Tail</c> of r - 1.6, <c>FarTail</c> of r - 5.
/// </summary>
/// <remarks>M. J. Wichura, Algorithm AS 241: The percentage points of the normal distribution, Applied Statistics 37 (1988).</remarks>
internal static class NormalQuantileRationals
{
    public static double CenterNumerator(double r) => Polynomial(
        r, 2.5090809287301226727e+3, 3.3430575583588128105e+4, 6.7265770927008700853e+4, 4.5921953931549871457e+4,
        1.3731693765509461125e+4, 1.9715909503065514427e+3, 1.3314166789178437745e+2, 3.3871328727963666080e0);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> CenterNumerator(Vector512<double> r) => Polynomial(
        r, 2.5090809287301226727e+3, 3.3430575583588128105e+4, 6.7265770927008700853e+4, 4.5921953931549871457e+4,
        1.3731693765509461125e+4, 1.9715909503065514427e+3, 1.3314166789178437745e+2, 3.3871328727963666080e0);

    public static double CenterDenominator(double r) => Polynomial(
        r, 5.2264952788528545610e+3, 2.8729085735721942674e+4, 3.9307895800092710610e+4, 2.1213794301586595867e+4,
        5.3941960214247511077e+3, 6.8718700749205790830e+2, 4.2313330701600911252e+1, 1.0);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> CenterDenominator(Vector512<double> r) => Polynomial(
        r, 5.2264952788528545610e+3, 2.8729085735721942674e+4, 3.9307895800092710610e+4, 2.1213794301586595867e+4,
        5.3941960214247511077e+3, 6.8718700749205790830e+2, 4.2313330701600911252e+1, 1.0);

    public static double TailNumerator(double r) => Polynomial(
        r, 7.74545014278341407640e-4, 2.27238449892691845833e-2, 2.41780725177450611770e-1, 1.27045825245236838258e0,
        3.64784832476320460504e0, 5.76949722146069140550e0, 4.63033784615654529590e0, 1.42343711074968357734e0);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> TailNumerator(Vector512<double> r) => Polynomial(
        r, 7.74545014278341407640e-4, 2.27238449892691845833e-2, 2.41780725177450611770e-1, 1.27045825245236838258e0,
        3.64784832476320460504e0, 5.76949722146069140550e0, 4.63033784615654529590e0, 1.42343711074968357734e0);

    public static double TailDenominator(double r) => Polynomial(
        r, 1.05075007164441684324e-9, 5.47593808499534494600e-4, 1.51986665636164571966e-2, 1.48103976427480074590e-1,
        6.89767334985100004550e-1, 1.67638483018380384940e0, 2.05319162663775882187e0, 1.0);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> TailDenominator(Vector512<double> r) => Polynomial(
        r, 1.05075007164441684324e-9, 5.47593808499534494600e-4, 1.51986665636164571966e-2, 1.48103976427480074590e-1,
        6.89767334985100004550e-1, 1.67638483018380384940e0, 2.05319162663775882187e0, 1.0);

    public static double FarTailNumerator(double r) => Polynomial(
        r, 2.01033439929228813265e-7, 2.71155556874348757815e-5, 1.24266094738807843860e-3, 2.65321895265761230930e-2,
        2.96560571828504891230e-1, 1.78482653991729133580e0, 5.46378491116411436990e0, 6.65790464350110377720e0);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> FarTailNumerator(Vector512<double> r) => Polynomial(
        r, 2.01033439929228813265e-7, 2.71155556874348757815e-5, 1.24266094738807843860e-3, 2.65321895265761230930e-2,
        2.96560571828504891230e-1, 1.78482653991729133580e0, 5.46378491116411436990e0, 6.65790464350110377720e0);

    public static double FarTailDenominator(double r) => Polynomial(
        r, 2.04426310338993978564e-15, 1.42151175831644588870e-7, 1.84631831751005468180e-5, 7.86869131145613259100e-4,
        1.48753612908506148525e-2, 1.36929880922735805310e-1, 5.99832206555887937690e-1, 1.0);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> FarTailDenominator(Vector512<double> r) => Polynomial(
        r, 2.04426310338993978564e-15, 1.42151175831644588870e-7, 1.84631831751005468180e-5, 7.86869131145613259100e-4,
        1.48753612908506148525e-2, 1.36929880922735805310e-1, 5.99832206555887937690e-1, 1.0);

    private static double Polynomial(
        double r, double c7, double c6, double c5, double c4, double c3, double c2, double c1, double c0)
    {
        double sum = Math.FusedMultiplyAdd(c7, r, c6);
        sum = Math.FusedMultiplyAdd(sum, r, c5);
        sum = Math.FusedMultiplyAdd(sum, r, c4);
        sum = Math.FusedMultiplyAdd(sum, r, c3);
        sum = Math.FusedMultiplyAdd(sum, r, c2);
        sum = Math.FusedMultiplyAdd(sum, r, c1);
        return Math.FusedMultiplyAdd(sum, r, c0);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Polynomial(
        Vector512<double> r, double c7, double c6, double c5, double c4, double c3, double c2, double c1, double c0)
    {
        Vector512<double> sum = Vector512.FusedMultiplyAdd(Vector512.Create(c7), r, Vector512.Create(c6));
        sum = Vector512.FusedMultiplyAdd(sum, r, Vector512.Create(c5));
        sum = Vector512.FusedMultiplyAdd(sum, r, Vector512.Create(c4));
        sum = Vector512.FusedMultiplyAdd(sum, r, Vector512.Create(c3));
        sum = Vector512.FusedMultiplyAdd(sum, r, Vector512.Create(c2));
        sum = Vector512.FusedMultiplyAdd(sum, r, Vector512.Create(c1));
        return Vector512.FusedMultiplyAdd(sum, r, Vector512.Create(c0));
    }
}
