using System.Globalization;

namespace RiskWorker.Benchmarks;

/// <summary>The committed results of one processor: a section a measurement, replaced when it is measured again.</summary>
internal static class ResultsFile
{
    /// <summary>The repository's root, found upwards from the program.</summary>
    public static string Root { get; } = FindRoot();

    /// <summary>Prints a section, and puts it into the file where <paramref name="record"/> says so.</summary>
    public static void Publish(string title, string text, bool record)
    {
        var section = string.Create(CultureInfo.InvariantCulture, $"## {title}\n{DateTime.UtcNow:yyyy-MM-dd}. {Machine.Description}\n\n{text.TrimEnd()}\n");
        Console.WriteLine(section);
        if (!record) return;
        var file = Path.Combine(Root, "tests", "RiskWorker.Benchmarks", "results", Machine.FileName + ".md");
        var sections = File.Exists(file) ? Sections(File.ReadAllText(file)) : [$"# {Machine.Processor}\n"];
        var place = sections.FindIndex(s => s.StartsWith($"## {title}\n", StringComparison.Ordinal));
        if (place < 0) sections.Add(section);
        else sections[place] = section;
        Directory.CreateDirectory(Path.GetDirectoryName(file)!);
        File.WriteAllText(file, string.Join('\n', sections));
        Console.WriteLine($"Recorded in {file}.");
    }

    private static List<string> Sections(string text)
    {
        var parts = text.Split("\n\n## ");
        return [parts[0].TrimEnd() + "\n", .. parts.Skip(1).Select(p => "## " + p.TrimEnd() + "\n")];
    }

    private static string FindRoot()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (folder is not null && !File.Exists(Path.Combine(folder.FullName, "RiskWorker.sln"))) folder = folder.Parent;
        return folder?.FullName ?? throw new InvalidOperationException("RiskWorker.sln is in no folder above the program.");
    }
}
