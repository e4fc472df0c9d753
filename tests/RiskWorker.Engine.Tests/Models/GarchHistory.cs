namespace RiskWorker.Engine.Tests.Models;

/// <summary>Shocks of a GARCH(1,1) process with planted parameters.</summary>
internal static class GarchHistory
{
    public const double Omega = 4e-6, Alpha = 0.1, Beta = 0.86;

    public static double[] Of(int days, int seed)
    {
        var (normals, shocks, variance) = (HistoryBook.Normals(days, seed), new double[days], Omega / (1 - Alpha - Beta));
        for (var t = 0; t < days; t++)
        {
            shocks[t] = Math.Sqrt(variance) * normals[t];
            variance = Omega + (Alpha * shocks[t] * shocks[t]) + (Beta * variance);
        }
        return shocks;
    }
}
