using System.Globalization;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Checks;

/// <summary>Gathers findings under the severities of the settings, and words their common parts.</summary>
internal sealed class FindingList(CheckSettings settings)
{
    private const int MostNames = 10;

    private readonly List<Finding> _findings = [];
    private static readonly Dictionary<string, int> s_order = FindingCodes.All.Select((c, i) => (c.Code, i)).ToDictionary(StringComparer.Ordinal);

    /// <summary>Adds a finding: <paramref name="statement"/> says what, how often, and what it does to the figures; the code's mend ends the sentence.</summary>
    public void Add(FindingCode code, string subject, string statement) => _findings.Add(code.Found(settings, subject, $"{statement}; {code.Mend}."));

    /// <summary>The findings gathered, as <see cref="InOrder"/> has them.</summary>
    public IReadOnlyList<Finding> Ordered() => InOrder(_findings);

    /// <summary>Blocking ones first, then in the table's order, then by subject.</summary>
    public static IReadOnlyList<Finding> InOrder(IEnumerable<Finding> findings) =>
    [
        .. findings.OrderByDescending(f => f.Severity).ThenBy(f => s_order.GetValueOrDefault(f.Code, int.MaxValue)).ThenBy(f => f.Subject, StringComparer.Ordinal),
    ];

    /// <summary>The first ten of <paramref name="names"/> and how many more there are.</summary>
    public static string Names(IReadOnlyCollection<string> names) => Names(names, names.Count);

    /// <summary>The same, where <paramref name="names"/> holds only the first of <paramref name="count"/>.</summary>
    public static string Names(IEnumerable<string> names, int count)
    {
        var first = string.Join(", ", names.Take(MostNames));
        return count > MostNames ? $"{first} and {Number(count - MostNames)} more" : first;
    }

    /// <summary>As in '1 factor has' and '3 factors have'.</summary>
    public static string Count(int count, string one, string several) => $"{Number(count)} {(count == 1 ? one : several)}";

    /// <summary>A whole number with its thousands apart.</summary>
    public static string Number(double value) => value.ToString("#,0", CultureInfo.InvariantCulture);
}
