using System.Text.Json;
using System.Text.RegularExpressions;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>The fields that every reader of a <c>results.json</c> of schema 1 may count on, each with what it holds; more may stand beside them.</summary>
internal static partial class ResultsShape
{
    private const string Nullable = "?";

    private static readonly (string Name, string Kind)[] s_run =
    [
        ("schema", "number"), ("run", "text"), ("asOf", "date"), ("status", "complete|degraded|failed"), ("model", "text"), ("scenarios", "number"), ("seed", "number"),
        ("snapshot", "hash"), ("version", "text"), ("figures", "hash"), ("nodes", "list"), ("models", "list"), ("limits", "list"), ("findings", "list"), ("backtest", "list"), ("timings", "object"),
    ];

    private static readonly (string, string)[] s_node = [("book", "text"), ("parent", "text?"), ("currency", "text"), ("value", "number"), ("measures", "list")];

    private static readonly (string, string)[] s_measure =
        [("measure", "var|es"), ("confidence", "number"), ("horizonDays", "number"), ("value", "number"), ("low", "number?"), ("high", "number?"), ("level", "number")];

    private static readonly (string, string)[] s_limit =
    [
        ("limit", "text"), ("book", "text"), ("measure", "var|es"), ("confidence", "number"), ("horizonDays", "number"), ("amount", "number"), ("value", "number"),
        ("used", "number?"), ("status", "within|warning|breached|inconclusive"),
    ];

    private static readonly (string, string)[] s_finding = [("severity", "blocking|warning"), ("code", "text"), ("subject", "text"), ("message", "text")];

    private static readonly (string, string)[] s_backtest = [("book", "text"), ("confidence", "number"), ("days", "number"), ("exceptions", "number"), ("zone", "green|yellow|red?")];

    private static readonly (string, string)[] s_timings = [("load", "number"), ("calibrate", "number"), ("simulate", "number"), ("report", "number")];

    public static void AssertOf(JsonElement results)
    {
        AssertFields(results, s_run);
        Assert.Equal(1, results.GetProperty("schema").GetInt32());
        AssertFields(results.GetProperty("timings"), s_timings);
        AssertEach(results, "limits", s_limit);
        AssertEach(results, "findings", s_finding);
        AssertEach(results, "backtest", s_backtest);
        AssertEach(results, "nodes", s_node);
        AssertNodes([.. results.GetProperty("nodes").EnumerateArray()]);
    }

    /// <summary>The root first, every node right below its parent or a sibling's branch, siblings by name, and the root's currency beside another.</summary>
    private static void AssertNodes(JsonElement[] nodes)
    {
        var path = new List<string>();
        var root = nodes[0].GetProperty("currency").GetString();
        var paths = new List<string[]>();
        foreach (var node in nodes)
        {
            var depth = node.GetProperty("parent").GetString() is { } parent ? path.IndexOf(parent) + 1 : 0;
            Assert.Equal(paths.Count == 0, depth == 0);
            path = [.. path.Take(depth), node.GetProperty("book").GetString()!];
            paths.Add([.. path]);
            AssertEach(node, "measures", s_measure);
            Assert.Equal(node.GetProperty("currency").GetString() != root, node.TryGetProperty("measuresRoot", out _));
            if (node.TryGetProperty("measuresRoot", out _)) AssertEach(node, "measuresRoot", s_measure);
        }
        Assert.Equal(paths.OrderBy(p => string.Join('\u0001', p), StringComparer.Ordinal), paths);
    }

    private static void AssertEach(JsonElement holder, string list, (string, string)[] fields)
    {
        Assert.NotEmpty(holder.GetProperty(list).EnumerateArray());
        Assert.All(holder.GetProperty(list).EnumerateArray(), item => AssertFields(item, fields));
    }

    /// <summary>The fields are there, first and in this order.</summary>
    private static void AssertFields(JsonElement element, (string Name, string Kind)[] fields)
    {
        var names = element.EnumerateObject().Select(p => p.Name).ToArray();
        Assert.Equal(fields.Select(f => f.Name), names.Where(n => fields.Any(f => f.Name == n)));
        Assert.Distinct(names);
        foreach (var (name, kind) in fields) Assert.True(Holds(element.GetProperty(name), kind), $"{name} holds {element.GetProperty(name)}, expected {kind}.");
    }

    private static bool Holds(JsonElement value, string kind)
    {
        if (value.ValueKind == JsonValueKind.Null) return kind.EndsWith(Nullable, StringComparison.Ordinal);
        return kind.TrimEnd(Nullable[0]) switch
        {
            "number" => value.ValueKind == JsonValueKind.Number,
            "list" => value.ValueKind == JsonValueKind.Array,
            "object" => value.ValueKind == JsonValueKind.Object,
            "text" => value.GetString() is { Length: > 0 },
            "date" => DateOnly.TryParseExact(value.GetString(), "yyyy-MM-dd", out _),
            "hash" => Sha256().IsMatch(value.GetString()!),
            var words => words.Split('|').Contains(value.GetString()),
        };
    }

    [GeneratedRegex("^sha256:[0-9a-f]{64}$")]
    private static partial Regex Sha256();
}
