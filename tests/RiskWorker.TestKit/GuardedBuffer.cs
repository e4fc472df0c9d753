using Xunit;

namespace RiskWorker.TestKit;

/// <summary>A span between two rows of guards, at a chosen offset from its array's start, that shows any write beside it.</summary>
public sealed class GuardedBuffer<T>
    where T : unmanaged, IEquatable<T>
{
    private const int Guards = 16;
    private readonly T[] memory;
    private readonly T guard;
    private readonly int start;
    private readonly int length;

    public GuardedBuffer(int length, T guard, int offset = 0)
    {
        this.guard = guard;
        this.length = length;
        start = Guards + offset;
        memory = new T[start + length + Guards];
        Array.Fill(memory, guard);
    }

    public Span<T> Span => memory.AsSpan(start, length);

    public void AssertIntact()
    {
        Assert.True(memory.AsSpan(0, start).IndexOfAnyExcept(guard) < 0, "A guard before the span was overwritten.");
        Assert.True(memory.AsSpan(start + length).IndexOfAnyExcept(guard) < 0, "A guard past the span was overwritten.");
    }
}
