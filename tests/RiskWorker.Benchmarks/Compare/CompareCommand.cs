using System.CommandLine;

namespace RiskWorker.Benchmarks.Compare;

/// <summary><c>compare</c>: the NumPy yardstick and the product in turn on the same invented book.</summary>
internal static class CompareCommand
{
    private static readonly Option<string> s_peer = new("--peer") { Description = "Folder of make_book.py and peer.py", Required = true };
    private static readonly Option<int> s_factors = Whole("--factors", 200, "Factors of the book");
    private static readonly Option<int> s_options = Whole("--options", 1000, "Options in it");
    private static readonly Option<int> s_books = Whole("--books", 20, "Books below the root");
    private static readonly Option<int> s_days = Whole("--days", 750, "Days of history");
    private static readonly Option<bool> s_full = new("--full") { Description = "Revalue every scenario fully, without price surfaces" };
    private static readonly Option<int> s_pairs = Whole("--pairs", 3, "Pairs of runs, one of each program in turn");
    private static readonly Option<int[]> s_scenarios = new("--scenarios")
    {
        Description = "Scenarios; several numbers give a table each, and how time grows",
        DefaultValueFactory = _ => [100_000],
        AllowMultipleArgumentsPerToken = true,
    };

    public static Command Create(Option<bool> record)
    {
        var command = new Command("compare", "Runs the NumPy yardstick and riskworker in turn on one invented book and prints the ratios")
        {
            s_peer, s_factors, s_options, s_books, s_days, s_scenarios, s_pairs, s_full, CommonPaths.Python, CommonPaths.Riskworker,
        };
        command.SetAction(parsed => Run(parsed, parsed.GetValue(record)));
        return command;
    }

    private static int Run(ParseResult parsed, bool record)
    {
        var programs = new Programs(parsed.GetValue(CommonPaths.Python)!, parsed.GetValue(s_peer)!, parsed.GetValue(CommonPaths.Riskworker)!);
        var size = new BookSize(parsed.GetValue(s_factors), parsed.GetValue(s_options), parsed.GetValue(s_books), parsed.GetValue(s_days), parsed.GetValue(s_full));
        var numPy = NumPy.Of(programs.Python);
        using var book = new StandardBook(programs, size);
        var comparisons = parsed.GetValue(s_scenarios)!.Select(n => Comparison.Measure(book, n, parsed.GetValue(s_pairs))).ToList();
        foreach (var comparison in comparisons)
            ResultsFile.Publish($"Against NumPy on {numPy.Blas}: {size}, {comparison.Scenarios:N0} scenarios", $"{numPy.Description}\n\n{comparison.Text()}", record);
        if (comparisons.Count > 1)
            ResultsFile.Publish($"Growth with scenarios: {size}", Comparison.Growth(comparisons), record);
        return comparisons.TrueForAll(c => c.Agrees) ? 0 : 1;
    }

    private static Option<int> Whole(string name, int value, string description) => new(name) { Description = description, DefaultValueFactory = _ => value };
}
