using System.CommandLine;
using System.Globalization;
using RiskWorker.Engine.Tests.Models;

namespace RiskWorker.Benchmarks.Coverage;

/// <summary><c>coverage</c>: how often the 95% intervals of VaR and ES hold the exact value, over 1,000 seeds and every law that is simulated.</summary>
internal static class CoverageCommand
{
    private const int Seeds = 1_000;
    private const int Scenarios = 20_000;
    private const double Level = (double)CoverageCase.Level;

    private static readonly double s_error = Math.Sqrt(Level * (1 - Level) / Seeds);

    public static Command Create(Option<bool> record)
    {
        var command = new Command("coverage", $"How often 95% intervals hold the exact VaR and ES, over {Seeds} seeds of {Scenarios} scenarios");
        command.SetAction(parsed => Run(parsed.GetValue(record)));
        return command;
    }

    private static int Run(bool record)
    {
        var table = new MarkdownTable("law", "VaR 99%: covered", "standard errors from 95%", "ES 97.5%: covered", "standard errors from 95%", "within 3");
        var passes = true;
        foreach (var (name, covered, isAtom) in CoverageCase.All.Select(c => (c.Name, c.Covered(Seeds, Scenarios), c.IsAtom)))
        {
            var (var, es) = (Distance(covered.Var), Distance(covered.Es));
            var within = var >= -3 && (isAtom || var <= 3) && Math.Abs(es) <= 3;
            passes &= within;
            table.Add(name, Share(covered.Var), Signed(var), Share(covered.Es), Signed(es), within ? "yes" : "NO");
        }
        ResultsFile.Publish("Coverage of the intervals", string.Create(CultureInfo.InvariantCulture,
            $"One long position in one factor; {Seeds:N0} seeds of {Scenarios:N0} scenarios. The standard error of a share is {100 * s_error:0.00}%. The VaR of filtered historical simulation is one of 1,950 equally likely losses: an interval that ends on it holds it, so that it is held at least as often as the level says, and only too seldom counts as a fault.\n\n{table}"), record);
        return passes ? 0 : 1;
    }

    private static double Distance(int covered) => (((double)covered / Seeds) - Level) / s_error;

    private static string Share(int covered) => string.Create(CultureInfo.InvariantCulture, $"{100.0 * covered / Seeds:0.0}%");

    private static string Signed(double distance) => distance.ToString("+0.0;-0.0;0.0", CultureInfo.InvariantCulture);
}
