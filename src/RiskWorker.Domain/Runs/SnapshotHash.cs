using System.Security.Cryptography;
using System.Text;

namespace RiskWorker.Domain.Runs;

/// <summary>A hashed part of a snapshot: a file, or one date of it.</summary>
/// <param name="Path">File, or file and date as in <c>observations/2026-11-27</c>.</param>
/// <param name="Hash">SHA-256 of its canonical text, 64 lower-case hex digits.</param>
public readonly record struct SnapshotPart(string Path, string Hash);

/// <summary>
/// The hash tree of a snapshot: dates under files, files under the root. A day's leaf is the same in every run that reads that day.
/// </summary>
public sealed record SnapshotHash
{
    private SnapshotHash(string root, IReadOnlyList<SnapshotPart> files)
    {
        Root = root;
        Files = files;
    }

    /// <summary>Hash of the whole: 64 lower-case hex digits.</summary>
    public string Root { get; }

    /// <summary>Hash by file, ordinal order: what a report prints and a comparison names.</summary>
    public IReadOnlyList<SnapshotPart> Files { get; }

    /// <summary>Combines leaves; their order does not matter, a repeated path is an error.</summary>
    /// <exception cref="ArgumentException">Two leaves share a path.</exception>
    public static SnapshotHash Of(IEnumerable<SnapshotPart> leaves)
    {
        var files = leaves.GroupBy(l => FileOf(l.Path), StringComparer.Ordinal)
            .Select(g => new SnapshotPart(g.Key, Combine(g)))
            .OrderBy(f => f.Path, StringComparer.Ordinal)
            .ToArray();
        return new(Combine(files), files);
    }

    /// <summary>SHA-256 of <paramref name="text"/> in UTF-8 as 64 lower-case hex digits.</summary>
    public static string OfText(string text) => OfBytes(Encoding.UTF8.GetBytes(text));

    /// <summary>SHA-256 of <paramref name="bytes"/> as 64 lower-case hex digits.</summary>
    public static string OfBytes(ReadOnlySpan<byte> bytes) => Convert.ToHexStringLower(SHA256.HashData(bytes));

    private static string FileOf(string path) => path.IndexOf('/') is var slash and >= 0 ? path[..slash] : path;

    private static string Combine(IEnumerable<SnapshotPart> parts)
    {
        var ordered = parts.ToArray();
        Array.Sort(ordered, static (a, b) => string.CompareOrdinal(a.Path, b.Path));
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        Span<byte> line = stackalloc byte[256];
        string? last = null;
        foreach (var part in ordered)
        {
            if (part.Path == last) throw new ArgumentException($"The path '{part.Path}' stands twice in one snapshot.", nameof(parts));
            var text = string.Concat(part.Path, " ", part.Hash, "\n");
            hash.AppendData(Encoding.UTF8.TryGetBytes(text, line, out var written) ? line[..written] : Encoding.UTF8.GetBytes(text));
            last = part.Path;
        }
        return Convert.ToHexStringLower(hash.GetHashAndReset());
    }
}
