using System.IO.Compression;

namespace RiskWorker.Storage.Sqlite;

/// <summary>Bytes compressed for the store.</summary>
internal static class Zlib
{
    public static byte[] Pack(ReadOnlySpan<byte> bytes)
    {
        using var packed = new MemoryStream();
        using (var deflate = new ZLibStream(packed, CompressionLevel.Optimal)) deflate.Write(bytes);
        return packed.ToArray();
    }

    /// <summary>Undoes <see cref="Pack"/>.</summary>
    /// <exception cref="InvalidDataException">The bytes are damaged.</exception>
    public static byte[] Unpack(byte[] packed)
    {
        using var bytes = new MemoryStream();
        using (var inflate = new ZLibStream(new MemoryStream(packed), CompressionMode.Decompress)) inflate.CopyTo(bytes);
        return bytes.ToArray();
    }
}
