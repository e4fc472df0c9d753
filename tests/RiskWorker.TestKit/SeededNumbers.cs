namespace RiskWorker.TestKit;

/// <summary>Seeded test numbers from SplitMix64 (Steele, Lea, Flood 2014): the same on every platform, and not the generator under test.</summary>
public sealed class SeededNumbers(ulong seed)
{
    private ulong state = seed;

    public ulong Bits()
    {
        state += 0x9E3779B97F4A7C15UL;
        ulong z = state;
        z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9UL;
        z = (z ^ (z >> 27)) * 0x94D049BB133111EBUL;
        return z ^ (z >> 31);
    }

    /// <summary>In [0, 1).</summary>
    public double Unit() => (Bits() >> 11) * (1.0 / 9007199254740992.0);

    public double Between(double low, double high) => low + ((high - low) * Unit());

    /// <summary>Any double at all: subnormals, infinities and NaN as often as their bit patterns.</summary>
    public double AnyDouble() => BitConverter.UInt64BitsToDouble(Bits());

    public double[] Between(double low, double high, int count)
    {
        var values = new double[count];
        for (int i = 0; i < count; i++)
            values[i] = Between(low, high);
        return values;
    }
}
