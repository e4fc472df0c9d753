using System.Text.RegularExpressions;

namespace RiskWorker.Host.Tests.Architecture;

/// <summary>Where things lie, and how thin the outer rooms are.</summary>
public sealed partial class LayoutTests
{
    private const int LongestFile = 350;

    public static TheoryData<string> Projects => [.. Repository.Projects.Keys];

    [Theory]
    [MemberData(nameof(Projects))]
    public void Namespace_of_every_file_is_its_folder(string project)
    {
        foreach (var source in Repository.Sources(project).Where(s => s != "Program.cs"))
        {
            var folder = Path.GetDirectoryName(source)!.Replace('/', '.');
            var expected = folder.Length == 0 ? "RiskWorker." + project : $"RiskWorker.{project}.{folder}";
            var declared = DeclaredNamespace().Match(Repository.Text(project, source)).Groups[1].Value;
            Assert.True(expected == declared, $"{project}/{source} declares the namespace '{declared}', expected '{expected}'.");
        }
    }

    [Theory]
    [MemberData(nameof(Projects))]
    public void No_file_is_longer_than_one_idea(string project)
    {
        foreach (var source in Repository.Sources(project))
        {
            var lines = File.ReadLines(Path.Combine(Repository.Folder(project), source)).Count();
            Assert.True(lines <= LongestFile, $"{project}/{source} has {lines} lines, at most {LongestFile} are allowed.");
        }
    }

    [Theory]
    [InlineData("Verbs")]
    [InlineData("Jobs")]
    [InlineData("Web")]
    public void Outer_rooms_of_the_host_reach_the_libraries_through_use_cases_alone(string room)
    {
        foreach (var source in Repository.Sources("Host").Where(s => s.StartsWith(room + "/", StringComparison.Ordinal)))
        {
            var reached = LibraryName().Matches(SourceText.CodeOf(Repository.Text("Host", source))).Select(m => m.Value);
            Assert.True(!reached.Any(), $"Host/{source} names {string.Join(", ", reached)}.");
        }
    }

    [Fact]
    public void Every_room_and_project_has_somebody_living_in_it()
    {
        var folders = Directory.GetDirectories(Path.Combine(Repository.Root, "src"), "*", SearchOption.AllDirectories)
            .Where(f => !OutputFolder().IsMatch(f.Replace('\\', '/') + "/"));
        Assert.All(folders, f => Assert.NotEmpty(Directory.EnumerateFiles(f, "*", SearchOption.AllDirectories)));
    }

    [GeneratedRegex(@"^namespace ([\w.]+);", RegexOptions.Multiline)]
    private static partial Regex DeclaredNamespace();

    [GeneratedRegex(@"\bRiskWorker\.(Engine|Storage|Reporting|Numerics|Cluster)\b|\b(?<!\.)(Engine|Storage|Reporting|Numerics)\.\w+")]
    private static partial Regex LibraryName();

    [GeneratedRegex("/(bin|obj)/")]
    private static partial Regex OutputFolder();
}
