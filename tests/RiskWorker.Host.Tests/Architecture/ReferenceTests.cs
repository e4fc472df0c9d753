using System.Reflection;

namespace RiskWorker.Host.Tests.Architecture;

/// <summary>The table of projects: who may reference whom, and which packages live where.</summary>
public sealed class ReferenceTests
{
    private static readonly Dictionary<string, string[]> s_projects = new(StringComparer.Ordinal)
    {
        ["Numerics"] = [],
        ["Domain"] = [],
        ["Engine"] = ["Numerics", "Domain"],
        ["Storage"] = ["Domain"],
        ["Reporting"] = ["Domain"],
        ["Cluster"] = ["Engine", "Domain"],
        ["Host"] = ["Numerics", "Domain", "Engine", "Storage", "Reporting", "Cluster"],
    };

    private static readonly Dictionary<string, string[]> s_packages = new(StringComparer.Ordinal)
    {
        ["Numerics"] = ["MathNet.Numerics"],
        ["Domain"] = [],
        ["Engine"] = ["MathNet.Numerics"],
        ["Storage"] = ["Microsoft.Data.Sqlite", "Sep", "MiniExcel", "Parquet.Net", "Npgsql"],
        ["Reporting"] = ["SkiaSharp", "SkiaSharp.NativeAssets.Linux.NoDependencies", "ScottPlot"],
        ["Cluster"] = ["Microsoft.Orleans.Server", "Microsoft.Orleans.Sdk", "Microsoft.Orleans.Clustering.AdoNet", "Microsoft.Orleans.Connections.Security"],
        ["Host"] = ["Quartz", "System.CommandLine", "Spectre.Console", "MailKit", "Polly", "OpenTelemetry", "System.Security.Cryptography.Pkcs"],
    };

    /// <summary>Assemblies of a package where they are not named after it.</summary>
    private static readonly Dictionary<string, string[]> s_assemblies = new(StringComparer.Ordinal)
    {
        ["Microsoft.Data.Sqlite"] = ["Microsoft.Data.Sqlite", "SQLitePCLRaw.core"],
        ["Sep"] = ["nietras.SepLib", "Sep"],
        ["Spectre.Console"] = ["Spectre.Console", "Spectre.Console.Ansi"],
    };

    public static TheoryData<string> Projects => [.. Repository.Projects.Keys];

    [Fact]
    public void Projects_of_src_are_all_in_the_table() => Assert.All(Repository.Projects.Keys, p => Assert.Contains(p, s_projects.Keys));

    [Theory]
    [MemberData(nameof(Projects))]
    public void Project_file_references_only_what_the_table_allows(string project)
    {
        var references = Repository.References(project, "ProjectReference").Select(r => Repository.Short(Path.GetFileNameWithoutExtension(r.Replace('\\', '/'))));
        Assert.All(references, r => Assert.Contains(r, s_projects[project]));
    }

    [Theory]
    [MemberData(nameof(Projects))]
    public void Project_file_takes_only_the_packages_of_the_table(string project)
    {
        Assert.All(Repository.References(project, "PackageReference"), p => Assert.Contains(p, s_packages[project]));
        Assert.All(Repository.References(project, "FrameworkReference"), f => Assert.Equal(("Host", "Microsoft.AspNetCore.App"), (project, f)));
    }

    [Theory]
    [MemberData(nameof(Projects))]
    public void Assembly_references_only_what_the_table_allows(string project)
    {
        var allowed = s_packages[project].SelectMany(p => s_assemblies.GetValueOrDefault(p, [p]))
            .Concat(s_projects[project].Select(p => "RiskWorker." + p)).ToHashSet(StringComparer.Ordinal);
        var references = AssemblyOf(project).GetReferencedAssemblies().Select(a => a.Name!).Where(n => !IsFramework(n, project));
        Assert.All(references, r => Assert.Contains(r, allowed));
    }

    private static Assembly AssemblyOf(string project) => Assembly.Load(project == "Host" ? "riskworker" : "RiskWorker." + project);

    private static bool IsFramework(string name, string project) =>
        name is "netstandard" or "mscorlib" || name.StartsWith("System.", StringComparison.Ordinal) && name != "System.CommandLine"
        || project == "Host" && (name.StartsWith("Microsoft.Extensions.", StringComparison.Ordinal) || name.StartsWith("Microsoft.AspNetCore.", StringComparison.Ordinal));
}
