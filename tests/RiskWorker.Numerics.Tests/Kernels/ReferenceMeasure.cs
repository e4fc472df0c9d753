using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class ReferenceMeasure
{
    [Fact]
    public void Measure()
    {
        var worst = new Dictionary<string, (double, string)>();
        void Note(string k, double e, ClosedFormReference r) { if (double.IsNaN(e)) e = 1e300; if (!worst.TryGetValue(k, out var w) || e > w.Item1) worst[k] = (e, $"{r.Name} {r.Spot0} {r.At} K={r.Strike} {string.Join('|', r.Terms)} exp {r.Head}"); }
        foreach (var r in ClosedFormReference.Rows("moved-reference.csv"))
        {
            bool call = r.Name.EndsWith("call");
            if (r.Name.StartsWith("plain")) { var e = r.ErrorOf(MovedOption.Value(new(r.Spot0, r.Strike, call), r.At)) / r.Levels; Note("plain", e, r); }
            else
            {
                bool cash = r.Name.StartsWith("cash");
                var t = cash ? DigitalOptionTerms.CashOrNothing(r.Spot0, r.Strike, 1, call) : DigitalOptionTerms.AssetOrNothing(r.Spot0, r.Strike, call);
                var lev = cash ? Math.Exp(-r.At.Discount) : r.At.Spot * Math.Exp(-r.At.Carry);
                var e = r.ErrorOf(DigitalOption.Value(t, r.At)) / lev;
                Note("digital raw", e, r); Note("digital cond", e / r.Conditioning, r);
                Note("digital rel cond", r.Head > 1e-250 ? e * lev / r.Head / r.Conditioning / r.Conditioning : 0, r);
            }
        }
        foreach (var r in ClosedFormReference.Rows("barrier-reference.csv"))
        {
            var t = new BarrierOptionTerms(r.Spot0, r.Strike, r.Number(0), r.Name.EndsWith("call"), r.Name.StartsWith("up"), r.Name.Contains("-in-"), r.Number(1), r.Number(2), r.Number(3));
            var e = r.ErrorOf(BarrierOption.Value(t, r.At)) / (r.Levels + r.Number(1));
            Note("barrier raw", e, r);
            var gap = Math.Abs(Math.Log(r.Spot0 / r.Number(0)));
            Note("barrier cond", e / (r.Conditioning + gap / r.At.Deviation), r);
            Note("barrier cond2", e / Math.Pow(r.Conditioning + gap / r.At.Deviation, 2), r);
            if (r.At.Deviation > 0.05) Note("barrier w>0.05", e, r);
            if (r.At.Deviation > 0.01) Note("barrier w>0.01", e, r);
        }
        foreach (var r in ClosedFormReference.Rows("geometric-reference.csv"))
        {
            bool call = r.Name == "call";
            var t = r.Terms[3] != "" ? GeometricAsianTerms.Continuous(r.Spot0, r.Strike, r.Number(0), r.Number(3), r.Number(4), call)
                : GeometricAsianTerms.Discrete(r.Spot0, r.Strike, r.Number(0), Many(r.Terms[1]), Many(r.Terms[2]), call);
            Note("geo", r.ErrorOf(GeometricAsianOption.Value(t, r.At)) / r.Levels, r);
        }
        Assert.Fail(string.Join("\n", worst.Select(w => $"{w.Key}: {w.Value.Item1:E3} at {w.Value.Item2}")));
    }
    private static double[] Many(string t) => t == "" ? [] : [.. t.Split(';').Select(Table.Number)];
}
