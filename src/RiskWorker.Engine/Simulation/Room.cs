namespace RiskWorker.Engine.Simulation;

/// <summary>Buffers that grow and never shrink.</summary>
internal static class Room
{
    /// <summary>Sees that <paramref name="buffer"/> holds at least <paramref name="length"/> elements; what they are is left open.</summary>
    public static void For<T>(ref T[] buffer, int length)
    {
        if (buffer.Length < length) buffer = new T[length];
    }
}
