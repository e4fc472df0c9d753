using System.Buffers.Binary;
using System.Security.Cryptography;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

/// <summary>SHA-256 over the bits of a calibrated model's numbers.</summary>
internal static class ModelBits
{
    public static string Hash(CalibratedModel model)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        foreach (var numbers in new[] { model.Levels, model.Deviations, model.DailyDrift, model.Lower, [model.RepairDistance ?? -1] })
        {
            foreach (var number in numbers) Append(hash, BitConverter.DoubleToInt64Bits(number));
        }
        foreach (var factor in model.Moving) Append(hash, factor);
        Append(hash, model.Rank);
        return Convert.ToHexStringLower(hash.GetHashAndReset());
    }

    private static void Append(IncrementalHash hash, long bits)
    {
        Span<byte> bytes = stackalloc byte[8];
        BinaryPrimitives.WriteInt64LittleEndian(bytes, bits);
        hash.AppendData(bytes);
    }
}
