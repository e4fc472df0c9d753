using System.CommandLine;
using System.Diagnostics;
using System.Globalization;
using System.Text.Json;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Benchmarks.WalkForward;

/// <summary><c>walk-forward</c>: the demo's positions of today over its past days, here and in NumPy in turn.</summary>
internal static class WalkForwardCommand
{
    private const double HalfWidth = 1.959963984540054;

    // Of 1,500 figures one in 1,200 tries would lie beyond by chance.
    private const double Accepted = 5;

    private static readonly Option<string> s_config = new("--config")
    {
        Description = "Folder whose feed/ is walked",
        DefaultValueFactory = _ => Path.Combine(ResultsFile.Root, "config-demo"),
    };

    private static readonly Option<int> s_days = new("--days") { Description = "Days", DefaultValueFactory = _ => 750 };
    private static readonly Option<int> s_scenarios = new("--scenarios") { Description = "Scenarios a day", DefaultValueFactory = _ => 50_000 };
    private static readonly Option<int> s_pairs = new("--pairs") { Description = "Pairs of loops", DefaultValueFactory = _ => 1 };
    private static readonly Option<bool> s_drawOnce = new("--draw-once") { Description = "Let NumPy draw its normals once for all days" };

    public static Command Create(Option<bool> record)
    {
        var command = new Command("walk-forward", "Measures today's positions on each of the past days, here and in NumPy")
        {
            s_config, s_days, s_scenarios, s_pairs, s_drawOnce, CommonPaths.Python,
        };
        command.SetAction(parsed => Run(parsed, parsed.GetValue(record)));
        return command;
    }

    private static int Run(ParseResult parsed, bool record)
    {
        var (days, scenarios, drawOnce) = (parsed.GetValue(s_days), parsed.GetValue(s_scenarios), parsed.GetValue(s_drawOnce));
        var (python, config) = (parsed.GetValue(CommonPaths.Python)!, parsed.GetValue(s_config)!);
        var found = NumPy.Of(python);
        var table = new MarkdownTable("pair", "NumPy, s", "day by day, s", "ratio", "days side by side, s", "ratio");
        var worst = 0.0;
        for (var pair = 1; pair <= parsed.GetValue(s_pairs); pair++)
        {
            using var numPy = JsonDocument.Parse(InNumPy(python, config, days, scenarios, drawOnce));
            var (ours, dayByDay, sideBySide) = Here(config, days, scenarios);
            var theirs = numPy.RootElement.GetProperty("seconds").GetDouble();
            worst = Math.Max(worst, FarthestApart(numPy, ours));
            table.Add(pair.ToString(CultureInfo.InvariantCulture), Text(theirs, "0.0"), Text(dayByDay, "0.00"), Text(theirs / dayByDay, "0.0"), Text(sideBySide, "0.00"), Text(theirs / sideBySide, "0.0"));
        }
        var draws = drawOnce ? "drawn once in NumPy, day by day in ours" : "drawn day by day";
        ResultsFile.Publish($"Walk-forward against NumPy on {found.Blas}: {days} days of {scenarios:N0} scenarios, normals {draws}",
            $"{found.Description}\n\n{table}\nThe firm's VaR and ES of all days: at most {Text(worst, "0.00")} standard errors of the difference apart ({(worst <= Accepted ? "within" : "BEYOND")} {Accepted}).\n", record);
        return worst <= Accepted ? 0 : 1;
    }

    private static string InNumPy(string python, string config, int days, int scenarios, bool drawOnce)
    {
        string[] arguments =
        [
            Path.Combine(AppContext.BaseDirectory, "WalkForward", "walk_forward.py"), config, "--days", days.ToString(CultureInfo.InvariantCulture),
            "--scenarios", scenarios.ToString(CultureInfo.InvariantCulture), .. drawOnce ? ["--draw-once"] : Array.Empty<string>(),
        ];
        return ChildProcess.Run(python, arguments).Output;
    }

    /// <summary>The loop alone is timed, as in NumPy: the feed has been read. Both ways give the same bits, or there is no result.</summary>
    private static (DayMeasures[] Measures, double DayByDay, double SideBySide) Here(string config, int days, int scenarios)
    {
        var positions = new FixedPositions(config, scenarios, seed: 1);
        var dates = positions.Dates(days);
        var clock = Stopwatch.StartNew();
        var dayByDay = positions.DayByDay(dates);
        var first = clock.Elapsed.TotalSeconds;
        clock.Restart();
        var sideBySide = positions.SideBySide(dates);
        var second = clock.Elapsed.TotalSeconds;
        return dayByDay.SequenceEqual(sideBySide) ? (dayByDay, first, second) : throw new InvalidOperationException("Days side by side gave other figures than day by day.");
    }

    private static double FarthestApart(JsonDocument numPy, DayMeasures[] ours)
    {
        var theirs = numPy.RootElement.GetProperty("days").EnumerateArray().ToList();
        if (theirs.Count != ours.Length) throw new InvalidOperationException($"NumPy measured {theirs.Count} days, we {ours.Length}.");
        return theirs.Zip(ours).Max(day =>
        {
            var (their, our) = day;
            if (their.GetProperty("date").GetString() != our.Date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture)) throw new InvalidOperationException("The two loops took different days.");
            return Math.Max(Distance(their.GetProperty("var").GetDouble(), our.Var), Distance(their.GetProperty("es").GetDouble(), our.Es));
        });
    }

    private static double Distance(double theirs, MeasureResult ours)
    {
        var error = (ours.High!.Value - ours.Low!.Value) / 2 / HalfWidth;
        return Math.Abs(theirs - ours.Value) / (Math.Sqrt(2) * error);
    }

    private static string Text(double value, string format) => value.ToString(format, CultureInfo.InvariantCulture);
}
