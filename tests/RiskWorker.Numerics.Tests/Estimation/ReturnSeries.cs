using RiskWorker.Numerics.Estimation;
using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Estimation;

/// <summary>Series of returns: one that the market made, and seeded ones.</summary>
internal static class ReturnSeries
{
    /// <summary>1,974 daily returns of the mark against the pound, in percent: see the data's README.</summary>
    public static double[] MarkPound() => [.. Table.Rows("estimation/mark-pound.csv").Select(row => Table.Number(row[1]))];

    /// <summary>Daily log-returns of four indices, row-major: DAX, SMI, CAC, FTSE.</summary>
    public static double[] Indices()
    {
        double[][] closes = [.. Table.Rows("estimation/index-closes.csv").Select(row => row[1..].Select(Table.Number).ToArray())];
        var days = closes.Length - 1;
        var returns = new double[4 * days];
        for (var i = 0; i < 4; i++)
        {
            for (var t = 0; t < days; t++) returns[(i * days) + t] = Logarithm.Of(closes[t + 1][i] / closes[t][i]);
        }
        return returns;
    }

    /// <summary>Independent standard normals.</summary>
    public static double[] Normals(int count, int seed)
    {
        var numbers = new SeededNumbers((ulong)seed);
        var normals = new double[count];
        for (var t = 0; t < count; t++) normals[t] = InverseNormal.Of(numbers.Unit() + 1e-17);
        return normals;
    }

    /// <summary>A path of the process from its level on.</summary>
    public static double[] Garch(GarchParameters process, int count, int seed)
    {
        var (path, normals) = (new double[count], Normals(count, seed));
        var variance = process.LevelVariance;
        for (var t = 0; t < count; t++)
        {
            var error = Math.Sqrt(variance) * normals[t];
            path[t] = process.Mean + error;
            variance = process.Next(error * error, variance);
        }
        return path;
    }

    /// <summary>Normals of a deviation with, on some days, jumps of another.</summary>
    public static double[] Jumping(int count, double deviation, double intensity, double mean, double jumpDeviation, int seed)
    {
        var (normals, sizes, numbers) = (Normals(count, seed), Normals(count, seed + 1000), new SeededNumbers((ulong)seed + 77));
        for (var t = 0; t < count; t++)
        {
            normals[t] *= deviation;
            if (numbers.Unit() < intensity) normals[t] += mean + (jumpDeviation * sizes[t]);
        }
        return normals;
    }
}
