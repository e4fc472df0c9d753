using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>
/// The hash over nodes, limits and backtest of a <c>results.json</c>, made from the file alone as a reader outside the program would:
/// one line a node, measure, limit and count, every number as the 16 hex digits of its bits, '-' where there is none.
/// </summary>
internal static class FiguresOfFile
{
    public static string Hash(JsonElement results)
    {
        var lines = new List<string>();
        foreach (var node in results.GetProperty("nodes").EnumerateArray())
        {
            lines.Add($"node {Word(node, "book")} {Word(node, "parent")} {Word(node, "currency")} {Bits(node, "value")} ");
            lines.AddRange(node.GetProperty("measures").EnumerateArray().Select(m => "measure " + Measure(m)));
            if (node.TryGetProperty("measuresRoot", out var root)) lines.AddRange(root.EnumerateArray().Select(m => "root " + Measure(m)));
        }
        foreach (var limit in results.GetProperty("limits").EnumerateArray())
            lines.Add($"limit {Word(limit, "limit")} {Word(limit, "book")} {Spec(limit)} {Bits(limit, "amount")} {Bits(limit, "value")} {Bits(limit, "used")} {Capital(limit, "status")}");
        foreach (var count in results.GetProperty("backtest").EnumerateArray())
        {
            var percent = (count.GetProperty("confidence").GetDecimal() * 100).ToString("0.#######", CultureInfo.InvariantCulture);
            lines.Add($"backtest {Word(count, "book")} {percent}% {count.GetProperty("days")} {count.GetProperty("exceptions")} {Capital(count, "zone")}");
        }
        var text = string.Concat(lines.Select(line => line + "\n"));
        return "sha256:" + Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text)));
    }

    private static string Measure(JsonElement m) => $"{Spec(m)} {Bits(m, "value")} {Bits(m, "low")} {Bits(m, "high")} {Bits(m, "level")} ";

    private static string Spec(JsonElement m) => $"{Capital(m, "measure")} {m.GetProperty("confidence").GetRawText()} {m.GetProperty("horizonDays")}";

    private static string Word(JsonElement element, string name) => element.GetProperty(name).GetString() ?? "-";

    private static string Capital(JsonElement element, string name) =>
        element.GetProperty(name).GetString() is { } word ? char.ToUpperInvariant(word[0]) + word[1..] : "-";

    private static string Bits(JsonElement element, string name) =>
        element.GetProperty(name) is { ValueKind: JsonValueKind.Number } number ? BitConverter.DoubleToUInt64Bits(number.GetDouble()).ToString("x16", CultureInfo.InvariantCulture) : "-";
}
