using System.Buffers;
using System.Security.Cryptography;
using System.Text;
using System.Text.Unicode;

namespace RiskWorker.Storage.Feed;

/// <summary>One look at a file's bytes: their digest, and where they stop being UTF-8.</summary>
/// <param name="Sha256">64 lower-case hex digits.</param>
/// <param name="InvalidLine">Line of the first byte that is not UTF-8; 0 when all are.</param>
/// <param name="InvalidByte">That byte.</param>
internal readonly record struct Utf8Inspection(string Sha256, long InvalidLine, byte InvalidByte)
{
    private const int ChunkLength = 1 << 16;

    /// <summary>Reads <paramref name="stream"/> from its start to its end.</summary>
    public static Utf8Inspection Of(Stream stream, CancellationToken cancellation)
    {
        using var digest = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        var buffer = new byte[ChunkLength];
        var (carried, lines, invalidLine, invalidByte) = (0, 0L, 0L, (byte)0);
        stream.Position = 0;
        while (true)
        {
            cancellation.ThrowIfCancellationRequested();
            var read = stream.Read(buffer, carried, buffer.Length - carried);
            digest.AppendData(buffer, carried, read);
            if (invalidLine > 0)
            {
                if (read == 0) break;
                continue;
            }
            var chunk = buffer.AsSpan(0, carried + read);
            var whole = read == 0 ? chunk.Length : WholeRunes(chunk);
            if (!Utf8.IsValid(chunk[..whole]))
            {
                var at = FirstInvalid(chunk[..whole]);
                (invalidLine, invalidByte) = (lines + chunk[..at].Count((byte)'\n') + 1, chunk[at]);
                carried = 0;
                continue;
            }
            lines += chunk[..whole].Count((byte)'\n');
            chunk[whole..].CopyTo(buffer);
            carried = chunk.Length - whole;
            if (read == 0) break;
        }
        return new(Convert.ToHexStringLower(digest.GetHashAndReset()), invalidLine, invalidByte);
    }

    /// <summary>Length without a rune that the end of the chunk cuts in two.</summary>
    private static int WholeRunes(ReadOnlySpan<byte> chunk)
    {
        for (var back = 1; back <= 3 && back <= chunk.Length; back++)
        {
            var lead = chunk[^back];
            if ((lead & 0xC0) == 0x80) continue;
            return Rune.DecodeFromUtf8(chunk[^back..], out _, out _) == OperationStatus.NeedMoreData ? chunk.Length - back : chunk.Length;
        }
        return chunk.Length;
    }

    private static int FirstInvalid(ReadOnlySpan<byte> bytes)
    {
        var at = 0;
        while (Rune.DecodeFromUtf8(bytes[at..], out _, out var consumed) == OperationStatus.Done) at += consumed;
        return at;
    }
}
