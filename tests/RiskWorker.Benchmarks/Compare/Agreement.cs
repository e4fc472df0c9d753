namespace RiskWorker.Benchmarks.Compare;

/// <summary>How far two programs' figures lie apart, in standard errors of their difference: both sample as much, independently.</summary>
/// <param name="Compared">Figures compared.</param>
/// <param name="Worst">The largest distance.</param>
/// <param name="Where">Whose it is.</param>
internal sealed record Agreement(int Compared, double Worst, string Where)
{
    /// <summary>The distance that is accepted.</summary>
    public const double Accepted = 4;

    public bool Holds => Worst <= Accepted;

    public static Agreement Between(Measurement peer, Measurement ours)
    {
        if (!peer.Figures.Keys.ToHashSet().SetEquals(ours.Figures.Keys)) throw new InvalidOperationException("The two programs report different books.");
        var distances = peer.Figures.Select(f => (f.Key, Distance: Distance(f.Value, ours.Figures[f.Key]))).ToList();
        var (key, distance) = distances.MaxBy(d => d.Distance);
        return new(distances.Count, distance, $"{key.Measure} of {key.Book}");
    }

    // Equal figures of a book without risk have no error, and lie 0 apart.
    private static double Distance(Figure peer, Figure ours) =>
        peer.Value == ours.Value ? 0 : Math.Abs(peer.Value - ours.Value) / (Math.Sqrt(2) * ours.StandardError);
}
