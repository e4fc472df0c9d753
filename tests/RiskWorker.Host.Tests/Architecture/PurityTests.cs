using System.Text.RegularExpressions;

namespace RiskWorker.Host.Tests.Architecture;

/// <summary>What a figure depends on is its snapshot and its seed: nothing else may reach it.</summary>
public sealed partial class PurityTests
{
    private static readonly string[] s_libraries = ["Numerics", "Domain", "Engine", "Reporting", "Storage", "Cluster"];
    private static readonly string[] s_pure = ["Numerics", "Domain", "Engine", "Reporting"];

    public static TheoryData<string> Libraries => [.. s_libraries.Intersect(Repository.Projects.Keys)];

    public static TheoryData<string> Pure => [.. s_pure];

    [Theory]
    [MemberData(nameof(Libraries))]
    public void Library_uses_no_ambient_clock_randomness_environment_or_console(string project) => AssertNowhere(project, Ambient());

    /// <summary>Durations are shown beside a run and enter no hash; only what times a run's phases may take them.</summary>
    [Theory]
    [MemberData(nameof(Libraries))]
    public void Library_measures_durations_only_where_a_runs_phases_are_timed(string project)
    {
        var timed = Repository.Sources(project).Where(s => Duration().IsMatch(SourceText.CodeOf(Repository.Text(project, s))));
        Assert.All(timed, s => Assert.Equal("Engine/Runs/RunCalculator.cs", $"{project}/{s}"));
    }

    [Theory]
    [MemberData(nameof(Pure))]
    public void Pure_library_touches_no_file(string project) => AssertNowhere(project, FileSystem());

    [Fact]
    public void Numerics_and_engine_use_no_function_whose_bits_depend_on_the_hardware()
    {
        AssertNowhere("Numerics", HardwareDependent());
        AssertNowhere("Engine", HardwareDependent());
    }

    [Theory]
    [InlineData("var t = DateTime.UtcNow;", true)]
    [InlineData("var t = System.DateTimeOffset.Now;", true)]
    [InlineData("Environment.GetEnvironmentVariable(name)", true)]
    [InlineData("System.Console.WriteLine(x)", true)]
    [InlineData("Random r = new(3);", true)]
    [InlineData("var r = new Random(3);", true)]
    [InlineData("using RiskWorker.Numerics.Random;", false)]
    [InlineData("Environment.ProcessorCount", true)]
    [InlineData("DateOnly now = date;", false)]
    public void Ambient_rule_sees_what_it_should(string code, bool isSeen) => Assert.Equal(isSeen, Ambient().IsMatch(code));

    [Theory]
    [InlineData("Math.Exp(x)", true)]
    [InlineData("Math.Expm1Kernel(x)", false)]
    [InlineData("MathF.Log2(x)", true)]
    [InlineData("double.Pow(x, 2)", true)]
    [InlineData("Vector512.MultiplyAddEstimate(a, b, c)", true)]
    [InlineData("Vector256.Log(a)", true)]
    [InlineData("Vector.Sum(v)", true)]
    [InlineData("Vector.FusedMultiplyAdd(a, b, c)", false)]
    [InlineData("TensorPrimitives.Exp(x, y)", true)]
    [InlineData("Math.FusedMultiplyAdd(a, b, c) + Math.Sqrt(d)", false)]
    [InlineData("Exp.Of(x)", false)]
    public void Hardware_rule_sees_what_it_should(string code, bool isSeen) => Assert.Equal(isSeen, HardwareDependent().IsMatch(code));

    private static void AssertNowhere(string project, Regex rule)
    {
        var sources = Repository.Sources(project);
        Assert.All(sources, source => Assert.Equal("", string.Join(", ", rule.Matches(SourceText.CodeOf(Repository.Text(project, source))).Select(m => m.Value))));
    }

    [GeneratedRegex(@"\bDateTime(Offset)?\.(Now|UtcNow|Today)\b|\bTimeProvider\.System\b|\bRandom\.Shared\b|\bnew Random\(|\bRandom \w+ = new\(|\bRandomNumberGenerator\b|\bGuid\.(NewGuid|CreateVersion7)\b|\bEnvironment\.\w+|\bConsole\.\w+")]
    private static partial Regex Ambient();

    [GeneratedRegex(@"\bStopwatch\b|\bGetTimestamp\(|\bGetElapsedTime\(")]
    private static partial Regex Duration();

    [GeneratedRegex(@"\b(File|Directory|FileStream|FileInfo|DirectoryInfo|StreamReader|StreamWriter|Process)\b(?=\s*[.(])|\bPath\.(GetTempPath|GetTempFileName|GetFullPath|Exists)\b")]
    private static partial Regex FileSystem();

    [GeneratedRegex(@"\b(Math|MathF|double|float|Double|Single)\.(Exp|Exp2|Exp10|ExpM1|Log|Log2|Log10|LogP1|ILogB|Pow|Cbrt|Sin|Cos|SinCos|Tan|Asin|Acos|Atan|Atan2|Sinh|Cosh|Tanh|Asinh|Acosh|Atanh|ReciprocalEstimate|ReciprocalSqrtEstimate|MultiplyAddEstimate)\b|\bVector(64|128|256|512)?\.(Exp|Log|Log2|Sin|Cos|SinCos|MultiplyAddEstimate|Sum|Dot)\b|\bTensorPrimitives\b")]
    private static partial Regex HardwareDependent();
}
