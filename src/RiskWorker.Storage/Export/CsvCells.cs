using System.Globalization;
using System.Text;

namespace RiskWorker.Storage.Export;

/// <summary>What the CSV exports share: RFC 4180, UTF-8 without a byte-order mark, '.' decimals that come back to the bit.</summary>
internal static class CsvCells
{
    /// <summary>A writer of lines that leaves <paramref name="stream"/> open.</summary>
    public static StreamWriter TextOn(Stream stream) => new(stream, new UTF8Encoding(false), leaveOpen: true) { NewLine = "\r\n" };

    /// <summary>A figure; empty where there is none.</summary>
    public static string Number(double? value) => value is { } number && double.IsFinite(number) ? number.ToString("R", CultureInfo.InvariantCulture) : "";

    /// <summary>A cell that a spreadsheet will not take for a formula, quoted where RFC 4180 asks for it.</summary>
    public static string Text(string? text)
    {
        if (string.IsNullOrEmpty(text)) return "";
        text = Neutral(text);
        return text.AsSpan().IndexOfAny(",\"\r\n") < 0 ? text : $"\"{text.Replace("\"", "\"\"", StringComparison.Ordinal)}\"";
    }

    /// <summary>Text that a spreadsheet will not take for a formula.</summary>
    public static string Neutral(string text) => text.Length > 0 && text[0] is '=' or '+' or '-' or '@' or '\t' or '\r' or '\n' ? "'" + text : text;
}
