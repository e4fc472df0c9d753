using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Tests.Simulation;

/// <summary>
/// Euler-stepped paths of dS = mu S dt + sigma S dW against the engine's exact solution for the same Brownian motion: the path
/// is a bridge to the W(1) that the engine's own draw stands for. Euler's scheme converges strongly with order 0.5
/// (Kloeden and Platen, Numerical Solution of Stochastic Differential Equations, 1992, theorem 10.2.2).
/// </summary>
public sealed class EulerConvergenceTests
{
    private const int Paths = 8_000;
    private const int Batches = 40;
    private const double S0 = 1, Mu = 0.05, Sigma = 0.2;
    private static readonly int[] s_steps = [8, 16, 32, 64, 128, 256, 512];

    private static readonly Lazy<double[][]> s_errors = new(StrongErrors);

    [Fact]
    public void Euler_paths_converge_to_the_exact_solution_with_strong_order_one_half()
    {
        var orders = s_errors.Value.Chunk(Paths / Batches).Select(batch => Order([.. s_steps.Select((_, k) => batch.Average(e => e[k]))])).ToArray();
        var (order, error) = MeanAndError(orders);
        // The next term of the error is smaller by a relative sigma² dt, 0.5% at eight steps: 0.001 of the slope over six halvings.
        Assert.True(Math.Abs(order - 0.5) <= (4 * error) + 0.001, $"order {order:f4} with a standard error of {error:f4}");
        Assert.True(error < 0.01, $"standard error {error:f4}");
    }

    // The error is S(1) sigma²/2 times the sum of (dW² - dt), nearly normal with the deviation S(1) sigma² sqrt(dt/2): its mean size
    // is E S(1) sigma² sqrt(dt/pi).
    [Fact]
    public void Euler_error_at_the_finest_step_has_the_size_of_its_leading_term()
    {
        var expected = S0 * Math.Exp(Mu) * Sigma * Sigma * Math.Sqrt(1.0 / 512 / Math.PI);
        var (found, error) = MeanAndError([.. s_errors.Value.Select(e => e[^1])]);
        Assert.True(Math.Abs(found - expected) <= 4 * error, $"{found:g5} against {expected:g5}, standard error {error:g2}");
    }

    /// <summary>|S_euler(1) - S(1)| by path, then by number of steps.</summary>
    private static double[][] StrongErrors()
    {
        var snapshot = SmallBooks.OneFactor(Sigma / Math.Sqrt(252), 1);
        snapshot = snapshot with { Settings = snapshot.Settings with { Model = snapshot.Settings.Model with { Drift = DriftKind.Explicit, Drifts = new Dictionary<string, double> { ["X"] = Mu } } } };
        var book = CompiledBook.Of(snapshot, 252);
        var losses = book.Losses(Paths)[0];
        var stream = new DrawStream(book.Plan.Seed, DrawPurpose.FactorMoves, 0);
        return [.. losses.Select((loss, i) =>
        {
            var increments = Bridge(book.Plan.Seed, (ulong)i, NormalDraws.At(stream, (ulong)i, 0));
            return s_steps.Select(n => Math.Abs(Euler(increments, n) - (S0 - loss))).ToArray();
        })];
    }

    /// <summary>The 512 increments of a Brownian path on [0, 1] that ends at <paramref name="end"/>.</summary>
    private static double[] Bridge(ulong seed, ulong scenario, double end)
    {
        var stream = new DrawStream(seed, DrawPurpose.PathSteps, 0);
        var increments = Enumerable.Range(0, s_steps[^1]).Select(j => NormalDraws.At(stream, scenario, (uint)j) * Math.Sqrt(1.0 / s_steps[^1])).ToArray();
        var excess = (increments.Sum() - end) / increments.Length;
        return Array.ConvertAll(increments, dw => dw - excess);
    }

    private static double Euler(double[] increments, int steps)
    {
        var (level, width) = (S0, increments.Length / steps);
        for (var i = 0; i < steps; i++)
        {
            var dw = 0.0;
            for (var j = 0; j < width; j++) dw += increments[(i * width) + j];
            level += level * ((Mu / steps) + (Sigma * dw));
        }
        return level;
    }

    /// <summary>Minus the least-squares slope of log2(error) on log2(steps).</summary>
    private static double Order(double[] errors)
    {
        var middle = (errors.Length - 1) / 2.0;
        var logs = errors.Select(Math.Log2).ToArray();
        return -logs.Select((y, k) => (k - middle) * y).Sum() / logs.Select((_, k) => (k - middle) * (k - middle)).Sum();
    }

    private static (double Mean, double Error) MeanAndError(double[] values)
    {
        var mean = values.Average();
        return (mean, Math.Sqrt(values.Sum(v => (v - mean) * (v - mean)) / (values.Length - 1) / values.Length));
    }
}
