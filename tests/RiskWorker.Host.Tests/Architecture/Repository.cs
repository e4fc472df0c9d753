using System.Xml.Linq;

namespace RiskWorker.Host.Tests.Architecture;

/// <summary>The repository's own files, found upwards from the test's folder.</summary>
internal static class Repository
{
    public static string Root { get; } = FindRoot();

    /// <summary>Projects of src by name, the common prefix left out.</summary>
    public static IReadOnlyDictionary<string, XDocument> Projects { get; } =
        Directory.GetFiles(Path.Combine(Root, "src"), "*.csproj", SearchOption.AllDirectories)
            .ToDictionary(f => Short(Path.GetFileNameWithoutExtension(f)), XDocument.Load, StringComparer.Ordinal);

    /// <summary>Hand-written source files of a project of src, as paths relative to the project's folder.</summary>
    public static IEnumerable<string> Sources(string project)
    {
        var folder = Folder(project);
        return Directory.GetFiles(folder, "*.cs", SearchOption.AllDirectories)
            .Select(f => Path.GetRelativePath(folder, f).Replace('\\', '/'))
            .Where(f => !f.StartsWith("bin/", StringComparison.Ordinal) && !f.StartsWith("obj/", StringComparison.Ordinal))
            .Order(StringComparer.Ordinal);
    }

    public static string Folder(string project) => Path.Combine(Root, "src", "RiskWorker." + project);

    public static string Text(string project, string source) => File.ReadAllText(Path.Combine(Folder(project), source));

    public static IEnumerable<string> References(string project, string element) =>
        Projects[project].Descendants(element).Select(e => e.Attribute("Include")!.Value);

    public static string Short(string name) => name.StartsWith("RiskWorker.", StringComparison.Ordinal) ? name["RiskWorker.".Length..] : name;

    private static string FindRoot()
    {
        var folder = new DirectoryInfo(AppContext.BaseDirectory);
        while (folder is not null && !File.Exists(Path.Combine(folder.FullName, "RiskWorker.sln"))) folder = folder.Parent;
        return folder?.FullName ?? throw new InvalidOperationException("RiskWorker.sln is in no folder above the tests.");
    }
}
