using System.Globalization;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>Data/models/exact.csv: made by Data/models/make_exact.py with NumPy and SciPy.</summary>
internal static class ExactValues
{
    public static (double Var, double? Es) Of(string name)
    {
        var row = File.ReadLines(Path.Combine(AppContext.BaseDirectory, "Data", "models", "exact.csv")).Select(l => l.Split(',')).Single(f => f[0] == name);
        return (double.Parse(row[^2], CultureInfo.InvariantCulture), row[^1].Length == 0 ? null : double.Parse(row[^1], CultureInfo.InvariantCulture));
    }
}
