using System.CommandLine;
using System.Globalization;

namespace RiskWorker.Benchmarks.Quality;

/// <summary><c>quality</c>: statistical tests of the draws, and the engine against closed forms at 10^7 scenarios.</summary>
internal static class QualityCommand
{
    // By chance alone one run in a thousand would fail somewhere.
    private const double ChanceOfFailing = 0.001;
    private const double Accepted = 4;

    public static Command Create(Option<bool> record)
    {
        var command = new Command("quality", "Tests 10^8 uniforms and normals, and VaR and ES at 10^7 scenarios against closed forms");
        command.SetAction(parsed => Run(parsed.GetValue(record)));
        return command;
    }

    private static int Run(bool record)
    {
        var tests = new[] { DrawKind.Uniforms, DrawKind.Normals }.SelectMany(kind => new Battery(kind).Run().Select(test => (kind, test))).ToList();
        var line = ChanceOfFailing / tests.Count;
        var table = new MarkdownTable("draws", "test", "statistic", "its law", "p-value", "passes");
        foreach (var (kind, test) in tests)
            table.Add(kind.Name, test.Name, Number(test.Statistic, "0.00"), test.Law, Number(test.P, "0.0000"), test.Passes(line) ? "yes" : "NO");
        ResultsFile.Publish("Quality of the draws", string.Create(CultureInfo.InvariantCulture,
            $"Seed 1, {2L * Battery.Pairs * Battery.Scenarios:N0} draws of each kind. A test passes where its p-value is {line / 2:0.0e0} or more from either end: one run in {1 / ChanceOfFailing:N0} would fail by chance. The statistic beside KS is the standardised mean of the p-values.\n\n{table}"), record);

        var cases = ExactCases.Run().ToList();
        var exact = new MarkdownTable("case", "exact", "measured", "standard errors apart", "within 4");
        foreach (var c in cases)
            exact.Add(c.Name, Number(c.Exact, "0.000000"), Number(c.Measured.Value, "0.000000"), Number(c.Distance, "0.00"), Math.Abs(c.Distance) <= Accepted ? "yes" : "NO");
        ResultsFile.Publish($"Closed forms at {ExactCases.Scenarios:N0} scenarios", exact.ToString(), record);
        return tests.TrueForAll(t => t.test.Passes(line)) && cases.TrueForAll(c => Math.Abs(c.Distance) <= Accepted) ? 0 : 1;
    }

    private static string Number(double value, string format) => value.ToString(format, CultureInfo.InvariantCulture);
}
