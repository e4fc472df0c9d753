using System.Diagnostics.CodeAnalysis;

namespace RiskWorker.Numerics.Random;

/// <summary>
/// Names an independent stream of draws. Equality of all three parts means the same numbers; any difference means
/// another region of the generator's 2^192 keys and counters.
/// </summary>
[SuppressMessage("Naming", "CA1711", Justification = "A stream of random numbers is the generator literature's own term.")]
public readonly record struct DrawStream
{
    /// <summary>Largest sub-index: 24 bits.</summary>
    public const uint MaxSubIndex = 0xFFFFFF;

    /// <param name="seed">The run's seed; its low half is key word 0, its high half key word 1.</param>
    /// <param name="purpose">What is drawn.</param>
    /// <param name="subIndex">Which one of that purpose, 0 to 16,777,215.</param>
    /// <exception cref="ArgumentOutOfRangeException">The sub-index needs more than 24 bits.</exception>
    public DrawStream(ulong seed, DrawPurpose purpose, uint subIndex)
    {
        if (subIndex > MaxSubIndex)
            throw new ArgumentOutOfRangeException(nameof(subIndex), subIndex, $"The sub-index is {subIndex}; it must be 0 to {MaxSubIndex}.");
        Seed = seed;
        Purpose = purpose;
        SubIndex = subIndex;
    }

    /// <summary>The run's seed.</summary>
    public ulong Seed { get; }

    /// <summary>What is drawn.</summary>
    public DrawPurpose Purpose { get; }

    /// <summary>Which one of that purpose.</summary>
    public uint SubIndex { get; }

    /// <summary>The low and the high half of the seed.</summary>
    internal (uint Word0, uint Word1) Key => ((uint)Seed, (uint)(Seed >> 32));

    /// <summary>The fourth counter word: purpose in the top 8 bits, sub-index below.</summary>
    internal uint Word => ((uint)Purpose << 24) | SubIndex;
}
