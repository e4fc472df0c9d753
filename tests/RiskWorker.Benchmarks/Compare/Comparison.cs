using System.Globalization;
using System.Text;

namespace RiskWorker.Benchmarks.Compare;

/// <summary>Pairs of runs at one number of scenarios.</summary>
internal sealed record Comparison(int Scenarios, IReadOnlyList<(Measurement Peer, Measurement Ours)> Pairs)
{
    private readonly Agreement _agreement = Agreement.Between(Pairs[0].Peer, Pairs[0].Ours);

    public bool Agrees => _agreement.Holds;

    /// <summary>Runs A B A B: what slows the machine for a while slows both.</summary>
    public static Comparison Measure(StandardBook book, int scenarios, int pairs)
    {
        var measured = new List<(Measurement, Measurement)>();
        for (var i = 0; i < pairs; i++) measured.Add((book.Peer(scenarios), book.Riskworker(scenarios)));
        return new(scenarios, measured);
    }

    public string Text()
    {
        var table = new MarkdownTable("pair", "simulate: NumPy, s", "ours, s", "ratio", "whole: NumPy, s", "ours, s", "ratio", "peak: NumPy, MB", "ours, MB");
        for (var i = 0; i < Pairs.Count; i++)
            Add(table, (i + 1).ToString(CultureInfo.InvariantCulture), m => m(Pairs[i].Peer), m => m(Pairs[i].Ours), Pairs[i].Peer.Simulate / Pairs[i].Ours.Simulate, Pairs[i].Peer.Whole / Pairs[i].Ours.Whole);
        Add(table, "median", m => Median(Pairs.Select(p => m(p.Peer))), m => Median(Pairs.Select(p => m(p.Ours))), Median(Pairs.Select(p => p.Peer.Simulate / p.Ours.Simulate)), Median(Pairs.Select(p => p.Peer.Whole / p.Ours.Whole)));
        var (peer, ours) = (Pairs.Min(p => p.Peer.Simulate), Pairs.Min(p => p.Ours.Simulate));
        Add(table, "fastest of each", m => Pairs.Min(p => m(p.Peer)), m => Pairs.Min(p => m(p.Ours)), peer / ours, Pairs.Min(p => p.Peer.Whole) / Pairs.Min(p => p.Ours.Whole));
        return new StringBuilder().Append(table)
            .Append(CultureInfo.InvariantCulture, $"\nPhases of ours, fastest of each: {Phases(p => p.Ours)}. Of NumPy: {Phases(p => p.Peer)}.\n")
            .Append(CultureInfo.InvariantCulture, $"\n{_agreement.Compared} figures compared; the farthest apart is {_agreement.Where}, by {_agreement.Worst:0.00} standard errors of the difference ({(Agrees ? "within" : "BEYOND")} {Agreement.Accepted}).\n")
            .ToString();
    }

    /// <summary>Time a scenario at the largest number over that at the smallest.</summary>
    public static string Growth(IReadOnlyList<Comparison> comparisons)
    {
        var table = new MarkdownTable("scenarios", "simulate, s", "ns a scenario", "whole, s", "peak, MB");
        foreach (var c in comparisons)
        {
            var simulate = c.Pairs.Min(p => p.Ours.Simulate);
            table.Add($"{c.Scenarios:N0}", Text(simulate, "0.000"), Text(simulate / c.Scenarios * 1e9, "0"), Text(c.Pairs.Min(p => p.Ours.Whole), "0.00"), Text(c.Pairs.Max(p => p.Ours.PeakMegabytes), "0"));
        }
        return table + "\nOurs, fastest of each; peak is the largest seen.\n";
    }

    private static void Add(MarkdownTable table, string name, Func<Func<Measurement, double>, double> peer, Func<Func<Measurement, double>, double> ours, double simulate, double whole) => table.Add(
        name, Text(peer(m => m.Simulate), "0.000"), Text(ours(m => m.Simulate), "0.000"), Text(simulate, "0.0"),
        Text(peer(m => m.Whole), "0.00"), Text(ours(m => m.Whole), "0.00"), Text(whole, "0.00"), Text(peer(m => m.PeakMegabytes), "0"), Text(ours(m => m.PeakMegabytes), "0"));

    private string Phases(Func<(Measurement Peer, Measurement Ours), Measurement> of) =>
        string.Join(", ", of(Pairs[0]).Phases.Select((phase, i) => string.Create(CultureInfo.InvariantCulture, $"{phase.Name} {Pairs.Min(p => of(p).Phases[i].Seconds):0.000} s")));

    private static double Median(IEnumerable<double> values)
    {
        var sorted = values.Order().ToArray();
        return (sorted[(sorted.Length - 1) / 2] + sorted[sorted.Length / 2]) / 2;
    }

    private static string Text(double value, string format) => value.ToString(format, CultureInfo.InvariantCulture);
}
