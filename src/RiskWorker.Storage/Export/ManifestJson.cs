using System.Text.Json;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Export;

/// <summary>Writes <c>manifest.json</c>: the files that belong together and their SHA-256, by name in ordinal order. The same files give the same bytes.</summary>
public static class ManifestJson
{
    private static readonly JsonWriterOptions s_indented = new() { Indented = true, NewLine = "\n" };

    /// <summary>Writes the hashes of <paramref name="files"/> to <paramref name="stream"/> as UTF-8 without a byte-order mark.</summary>
    /// <exception cref="ArgumentException">A name stands twice.</exception>
    public static void Write(IReadOnlyList<DocumentHash> files, Stream stream)
    {
        ArgumentNullException.ThrowIfNull(files);
        ArgumentNullException.ThrowIfNull(stream);
        if (files.CountBy(file => file.Name, StringComparer.Ordinal).FirstOrDefault(file => file.Value > 1) is { Key: { } twice })
            throw new ArgumentException($"The file '{twice}' stands twice in one manifest.", nameof(files));
        using var json = new Utf8JsonWriter(stream, s_indented);
        json.WriteStartObject();
        json.WriteNumber("schema", 1);
        json.Lines("files", [.. files.OrderBy(file => file.Name, StringComparer.Ordinal)], (line, file) =>
        {
            line.WriteString("name", file.Name);
            line.WriteString("sha256", file.Sha256);
        });
        json.WriteEndObject();
    }
}
