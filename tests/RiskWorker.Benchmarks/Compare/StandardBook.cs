using System.Globalization;

namespace RiskWorker.Benchmarks.Compare;

/// <summary>The size of an invented book, and whether the product may value it by surfaces.</summary>
internal sealed record BookSize(int Factors, int Options, int Books, int Days, bool IsFull)
{
    public string[] Arguments => ["--factors", Text(Factors), "--options", Text(Options), "--books", Text(Books), "--days", Text(Days)];

    public override string ToString() => $"{Factors} factors, {Options:N0} options, {Books} books, {Days} days{(IsFull ? ", full revaluation" : "")}";

    private static string Text(int number) => number.ToString(CultureInfo.InvariantCulture);
}

/// <summary>Where the yardstick and the product are.</summary>
/// <param name="Python">A Python with NumPy and SciPy.</param>
/// <param name="Peer">Folder of make_book.py and peer.py.</param>
/// <param name="Riskworker">The product's executable.</param>
internal sealed record Programs(string Python, string Peer, string Riskworker);

/// <summary>An invented book in a folder of its own, measured by either program with the same model: EWMA 0.94 over 500 days.</summary>
internal sealed class StandardBook : IDisposable
{
    private readonly Programs _programs;
    private readonly string _revaluation;
    private readonly DirectoryInfo _folder = Directory.CreateTempSubdirectory("riskworker-compare-");

    public StandardBook(Programs programs, BookSize size)
    {
        (_programs, _revaluation) = (programs, size.IsFull ? "full" : "surface");
        ChildProcess.Run(programs.Python, [Path.Combine(programs.Peer, "make_book.py"), _folder.FullName, .. size.Arguments]);
    }

    public void Dispose() => _folder.Delete(recursive: true);

    /// <summary>One run of the yardstick.</summary>
    public Measurement Peer(int scenarios) =>
        Measurement.OfPeer(ChildProcess.Run(_programs.Python, [Path.Combine(_programs.Peer, "peer.py"), _folder.FullName, "--scenarios", Text(scenarios)]));

    /// <summary>One run of the product into an empty folder, so that it reads the feed and builds its store; one look, as the yardstick takes.</summary>
    public Measurement Riskworker(int scenarios)
    {
        File.WriteAllText(Path.Combine(_folder.FullName, "riskworker.json"), $$"""{ "simulation": { "scenarios": {{Text(scenarios)}}, "cap": {{Text(scenarios)}}, "looks": 1, "revaluation": "{{_revaluation}}" } }""");
        var to = Directory.CreateDirectory(Path.Combine(_folder.FullName, "out"));
        try
        {
            string[] arguments = ["measure", "--config", _folder.FullName, "--out", to.FullName, "--json"];
            // A breached or undecided limit is a result.
            return Measurement.OfRiskworker(ChildProcess.Run(_programs.Riskworker, arguments, 1, 6), scenarios);
        }
        finally
        {
            to.Delete(recursive: true);
        }
    }

    private static string Text(int number) => number.ToString(CultureInfo.InvariantCulture);
}
