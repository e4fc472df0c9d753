using System.Diagnostics;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class SpeedMeasure
{
    private delegate void Run(in MarketSpans m, double[] p);

    [Fact]
    public void Measure()
    {
        int n = 4096;
        var b = MarketBlock.Seeded(5, 100, n);
        double[] x = new double[n], spot = new double[n], r = new double[n], q = new double[n], w = new double[n], p = new double[n], vol = new double[n];
        var numbers = new TestKit.SeededNumbers(3);
        for (int i = 0; i < n; i++) { x[i] = numbers.Between(-0.05, 0.05); spot[i] = LogNormalMoves.Spot(x[i], 100); r[i] = numbers.Between(0.01, 0.03); q[i] = 0.01; w[i] = numbers.Between(0.1, 0.3); vol[i] = w[i]; }
        var lines = new List<string>();
        void Time(string name, Run run)
        {
            double best = 1e9;
            for (int k = 0; k < 60; k++)
            {
                var m = new MarketSpans(x, spot, r, q, w);
                long t = Stopwatch.GetTimestamp();
                for (int j = 0; j < 20; j++) run(m, p);
                best = Math.Min(best, Stopwatch.GetElapsedTime(t).TotalNanoseconds / 20 / n);
            }
            lines.Add($"{name}: {best:F2} ns");
        }
        var e = new EuropeanOptionTerms(100, 104, 1, 0.2, 0.02, 0.01, true);
        Time("european flat", (in MarketSpans m, double[] o) => EuropeanOption.AccumulateValue(e, m.X, m.Spot, 3, 5, o));
        Time("european vol", (in MarketSpans m, double[] o) => EuropeanOption.AccumulateValue(e, m.X, m.Spot, m.Deviation, 3, 5, o));
        Time("exp", (in MarketSpans m, double[] o) => Exponential.Of(m.X, o));
        Time("cdf", (in MarketSpans m, double[] o) => NormalCdf.Of(m.X, o));
        var mo = new MovedOptionTerms(100, 104, true);
        Time("moved", (in MarketSpans m, double[] o) => MovedOption.AccumulateValue(mo, m, 3, 5, o));
        var d = DigitalOptionTerms.CashOrNothing(100, 104, 10, true);
        Time("digital", (in MarketSpans m, double[] o) => DigitalOption.AccumulateValue(d, m, 3, 5, o));
        var g = GeometricAsianTerms.Continuous(100, 104, 1, 0, 100, true);
        Time("geometric", (in MarketSpans m, double[] o) => GeometricAsianOption.AccumulateValue(g, m, 3, 5, o));
        foreach (var isIn in new[] { false, true })
            foreach (var isUp in new[] { false, true })
                foreach (var reb in new[] { 0.0, 3 })
                    foreach (var sp in new[] { 0.0, 1 / 252.0 })
                    {
                        var t = new BarrierOptionTerms(100, 104, isUp ? 130 : 80, true, isUp, isIn, reb, 1, sp);
                        Time($"barrier in={isIn} up={isUp} rebate={reb} spacing={sp > 0}", (in MarketSpans m, double[] o) => BarrierOption.AccumulateValue(t, m, 3, 5, o));
                    }
        Assert.Fail(string.Join("\n", lines));
    }
}
