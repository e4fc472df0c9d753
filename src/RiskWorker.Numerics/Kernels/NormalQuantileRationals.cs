using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// The three rational functions of Wichura's AS 241 (PPND16), each a numerator and a denominator of degree 7:
/// <c>Center</c> of 0.180625 - q², <c>Tail</c> of r - 1.6, <c>FarTail</c> of r - 5.
/// </summary>
/// <remarks>M. J. Wichura, Algorithm AS 241: The percentage points of the normal distribution, Applied Statistics 37 (1988).</remarks>
internal static class NormalQuantileRationals
{
    private const double A0 = 3.3871328727963666080e0;
    private const double A1 = 1.3314166789178437745e+2;
    private const double A2 = 1.9715909503065514427e+3;
    private const double A3 = 1.3731693765509461125e+4;
    private const double A4 = 4.5921953931549871457e+4;
    private const double A5 = 6.7265770927008700853e+4;
    private const double A6 = 3.3430575583588128105e+4;
    private const double A7 = 2.5090809287301226727e+3;

    private const double B1 = 4.2313330701600911252e+1;
    private const double B2 = 6.8718700749205790830e+2;
    private const double B3 = 5.3941960214247511077e+3;
    private const double B4 = 2.1213794301586595867e+4;
    private const double B5 = 3.9307895800092710610e+4;
    private const double B6 = 2.8729085735721942674e+4;
    private const double B7 = 5.2264952788528545610e+3;

    private const double C0 = 1.42343711074968357734e0;
    private const double C1 = 4.63033784615654529590e0;
    private const double C2 = 5.76949722146069140550e0;
    private const double C3 = 3.64784832476320460504e0;
    private const double C4 = 1.27045825245236838258e0;
    private const double C5 = 2.41780725177450611770e-1;
    private const double C6 = 2.27238449892691845833e-2;
    private const double C7 = 7.74545014278341407640e-4;

    private const double D1 = 2.05319162663775882187e0;
    private const double D2 = 1.67638483018380384940e0;
    private const double D3 = 6.89767334985100004550e-1;
    private const double D4 = 1.48103976427480074590e-1;
    private const double D5 = 1.51986665636164571966e-2;
    private const double D6 = 5.47593808499534494600e-4;
    private const double D7 = 1.05075007164441684324e-9;

    private const double E0 = 6.65790464350110377720e0;
    private const double E1 = 5.46378491116411436990e0;
    private const double E2 = 1.78482653991729133580e0;
    private const double E3 = 2.96560571828504891230e-1;
    private const double E4 = 2.65321895265761230930e-2;
    private const double E5 = 1.24266094738807843860e-3;
    private const double E6 = 2.71155556874348757815e-5;
    private const double E7 = 2.01033439929228813265e-7;

    private const double F1 = 5.99832206555887937690e-1;
    private const double F2 = 1.36929880922735805310e-1;
    private const double F3 = 1.48753612908506148525e-2;
    private const double F4 = 7.86869131145613259100e-4;
    private const double F5 = 1.84631831751005468180e-5;
    private const double F6 = 1.42151175831644588870e-7;
    private const double F7 = 2.04426310338993978564e-15;

    public static (double Numerator, double Denominator) Center(double r)
    {
        double numerator, denominator;
        numerator = Math.FusedMultiplyAdd(A7, r, A6);
        numerator = Math.FusedMultiplyAdd(numerator, r, A5);
        numerator = Math.FusedMultiplyAdd(numerator, r, A4);
        numerator = Math.FusedMultiplyAdd(numerator, r, A3);
        numerator = Math.FusedMultiplyAdd(numerator, r, A2);
        numerator = Math.FusedMultiplyAdd(numerator, r, A1);
        numerator = Math.FusedMultiplyAdd(numerator, r, A0);
        denominator = Math.FusedMultiplyAdd(B7, r, B6);
        denominator = Math.FusedMultiplyAdd(denominator, r, B5);
        denominator = Math.FusedMultiplyAdd(denominator, r, B4);
        denominator = Math.FusedMultiplyAdd(denominator, r, B3);
        denominator = Math.FusedMultiplyAdd(denominator, r, B2);
        denominator = Math.FusedMultiplyAdd(denominator, r, B1);
        denominator = Math.FusedMultiplyAdd(denominator, r, 1.0);
        return (numerator, denominator);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static (Vector512<double> Numerator, Vector512<double> Denominator) Center(Vector512<double> r)
    {
        Vector512<double> numerator, denominator;
        numerator = Vector512.FusedMultiplyAdd(Vector512.Create(A7), r, Vector512.Create(A6));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(A5));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(A4));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(A3));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(A2));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(A1));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(A0));
        denominator = Vector512.FusedMultiplyAdd(Vector512.Create(B7), r, Vector512.Create(B6));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(B5));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(B4));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(B3));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(B2));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(B1));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(1.0));
        return (numerator, denominator);
    }

    public static (double Numerator, double Denominator) Tail(double r)
    {
        double numerator, denominator;
        numerator = Math.FusedMultiplyAdd(C7, r, C6);
        numerator = Math.FusedMultiplyAdd(numerator, r, C5);
        numerator = Math.FusedMultiplyAdd(numerator, r, C4);
        numerator = Math.FusedMultiplyAdd(numerator, r, C3);
        numerator = Math.FusedMultiplyAdd(numerator, r, C2);
        numerator = Math.FusedMultiplyAdd(numerator, r, C1);
        numerator = Math.FusedMultiplyAdd(numerator, r, C0);
        denominator = Math.FusedMultiplyAdd(D7, r, D6);
        denominator = Math.FusedMultiplyAdd(denominator, r, D5);
        denominator = Math.FusedMultiplyAdd(denominator, r, D4);
        denominator = Math.FusedMultiplyAdd(denominator, r, D3);
        denominator = Math.FusedMultiplyAdd(denominator, r, D2);
        denominator = Math.FusedMultiplyAdd(denominator, r, D1);
        denominator = Math.FusedMultiplyAdd(denominator, r, 1.0);
        return (numerator, denominator);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static (Vector512<double> Numerator, Vector512<double> Denominator) Tail(Vector512<double> r)
    {
        Vector512<double> numerator, denominator;
        numerator = Vector512.FusedMultiplyAdd(Vector512.Create(C7), r, Vector512.Create(C6));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(C5));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(C4));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(C3));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(C2));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(C1));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(C0));
        denominator = Vector512.FusedMultiplyAdd(Vector512.Create(D7), r, Vector512.Create(D6));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(D5));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(D4));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(D3));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(D2));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(D1));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(1.0));
        return (numerator, denominator);
    }

    public static (double Numerator, double Denominator) FarTail(double r)
    {
        double numerator, denominator;
        numerator = Math.FusedMultiplyAdd(E7, r, E6);
        numerator = Math.FusedMultiplyAdd(numerator, r, E5);
        numerator = Math.FusedMultiplyAdd(numerator, r, E4);
        numerator = Math.FusedMultiplyAdd(numerator, r, E3);
        numerator = Math.FusedMultiplyAdd(numerator, r, E2);
        numerator = Math.FusedMultiplyAdd(numerator, r, E1);
        numerator = Math.FusedMultiplyAdd(numerator, r, E0);
        denominator = Math.FusedMultiplyAdd(F7, r, F6);
        denominator = Math.FusedMultiplyAdd(denominator, r, F5);
        denominator = Math.FusedMultiplyAdd(denominator, r, F4);
        denominator = Math.FusedMultiplyAdd(denominator, r, F3);
        denominator = Math.FusedMultiplyAdd(denominator, r, F2);
        denominator = Math.FusedMultiplyAdd(denominator, r, F1);
        denominator = Math.FusedMultiplyAdd(denominator, r, 1.0);
        return (numerator, denominator);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static (Vector512<double> Numerator, Vector512<double> Denominator) FarTail(Vector512<double> r)
    {
        Vector512<double> numerator, denominator;
        numerator = Vector512.FusedMultiplyAdd(Vector512.Create(E7), r, Vector512.Create(E6));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(E5));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(E4));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(E3));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(E2));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(E1));
        numerator = Vector512.FusedMultiplyAdd(numerator, r, Vector512.Create(E0));
        denominator = Vector512.FusedMultiplyAdd(Vector512.Create(F7), r, Vector512.Create(F6));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(F5));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(F4));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(F3));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(F2));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(F1));
        denominator = Vector512.FusedMultiplyAdd(denominator, r, Vector512.Create(1.0));
        return (numerator, denominator);
    }
}
