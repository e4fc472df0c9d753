using System.Text;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

/// <summary>Settings of every kind of model as the text of a snapshot's part, and back to the bit.</summary>
public sealed class ModelTextTests
{
    private static readonly JumpSettings s_given = new()
    {
        CommonPerYear = 1.0 / 3,
        Common = new SortedDictionary<string, JumpSize>(StringComparer.Ordinal) { ["A"] = new(-0.1, 0.2), ["Tab\tbed"] = new(5e-324, -0.0) },
        Own = new SortedDictionary<string, OwnJumps>(StringComparer.Ordinal) { ["B\\n"] = new(12.5, new(0.1, 0.3)) },
    };

    public static IReadOnlyList<ModelSettings> Models { get; } =
    [
        new() { Name = "plain" },
        new() { Name = "shrunk", Covariance = CovarianceEstimator.Shrunk, Lambda = 0.97, Window = 250, Drift = DriftKind.Historical, MissingDays = MissingDays.Pairwise },
        new() { Name = "drifts", Covariance = CovarianceEstimator.Equal, Drift = DriftKind.Explicit, Drifts = Drifts(("A", 0.05), ("B", -0.0)) },
        new() { Name = "t", Kind = ModelKind.StudentT, DegreesOfFreedom = 4.1, Drift = DriftKind.Explicit, Drifts = Drifts(("B", 1.0 / 3)) },
        new() { Name = "t own", Kind = ModelKind.StudentT, Margins = StudentMargins.Own, MissingDays = MissingDays.Pairwise },
        new() { Name = "past", Kind = ModelKind.Historical, Window = 300 },
        new() { Name = "aged", Kind = ModelKind.Historical, AgeWeight = 0.98 },
        new() { Name = "filtered", Kind = ModelKind.FilteredHistorical, Lambda = 0.9 },
        new() { Name = "garch", Kind = ModelKind.FilteredHistorical, Volatility = VolatilityFilter.Garch },
        new() { Name = "found", Kind = ModelKind.JumpDiffusion, Jumps = new() { Threshold = 3.25 } },
        new() { Name = "given", Kind = ModelKind.JumpDiffusion, Jumps = s_given },
        new() { Name = "stress", Kind = ModelKind.Stressed, Span = 120, Stressed = new() { Name = "of", Kind = ModelKind.JumpDiffusion, Jumps = s_given, Drift = DriftKind.Explicit, Drifts = Drifts(("C", 2)) } },
    ];

    [Fact]
    public void Read_of_a_model_of_record_gives_it_back_to_the_bit() =>
        Assert.All(Models, model => BitEqual.Assert(new RunSettings { Model = model }, Back(new() { Model = model })));

    // All at once, so that no row of one is taken for another's.
    [Fact]
    public void Read_of_many_challengers_gives_each_back_to_the_bit()
    {
        var settings = new RunSettings { Model = Models[^1], Challengers = [.. Models.Take(Models.Count - 1), .. Models.Select(m => m with { Name = m.Name + " again" })] };
        BitEqual.Assert(settings, Back(settings));
    }

    [Fact]
    public void Hash_tells_models_and_challengers_apart()
    {
        RunSettings[] settings = [.. Models.Select(m => new RunSettings { Model = m }), .. Models.Select(m => new RunSettings { Challengers = [m] }), new() { Challengers = [Models[0], Models[1]] }, new() { Challengers = [Models[1], Models[0]] }];
        Assert.Equal(settings.Length, settings.Select(s => SettingsText.Leaf(s).Part.Hash).Distinct().Count());
    }

    [Fact]
    public void Hash_depends_on_whatever_the_kind_uses()
    {
        ModelSettings student = new() { Kind = ModelKind.StudentT }, past = new() { Kind = ModelKind.Historical }, filtered = new() { Kind = ModelKind.FilteredHistorical };
        ModelSettings jumps = new() { Kind = ModelKind.JumpDiffusion, Jumps = s_given }, stressed = new() { Kind = ModelKind.Stressed, Stressed = new() };
        JumpSettings Own(OwnJumps own) => s_given with { Own = new SortedDictionary<string, OwnJumps> { ["B"] = own } };
        JumpSettings Common(JumpSize size) => s_given with { Common = new SortedDictionary<string, JumpSize> { ["A"] = size } };
        ModelSettings[] changed =
        [
            student, student with { DegreesOfFreedom = 4 }, student with { DegreesOfFreedom = 5 }, student with { Margins = StudentMargins.Own },
            past, past with { AgeWeight = 0.9 }, past with { AgeWeight = 0.99 },
            filtered, filtered with { Volatility = VolatilityFilter.Garch }, filtered with { Lambda = 0.9 },
            jumps, jumps with { Jumps = s_given with { CommonPerYear = 7 } }, jumps with { Jumps = new() }, jumps with { Jumps = new() { Threshold = 5 } },
            jumps with { Jumps = Own(new(1, new(0, 0.1))) }, jumps with { Jumps = Own(new(2, new(0, 0.1))) }, jumps with { Jumps = Own(new(1, new(0.1, 0.1))) }, jumps with { Jumps = Own(new(1, new(0, 0.2))) },
            jumps with { Jumps = Common(new(0, 0.1)) }, jumps with { Jumps = Common(new(0.1, 0.1)) }, jumps with { Jumps = Common(new(0, 0.2)) },
            stressed, stressed with { Span = 251 }, stressed with { Stressed = new() { Lambda = 0.5 } }, stressed with { Stressed = past },
        ];
        Assert.Equal(changed.Length, changed.Select(m => SettingsText.Leaf(new() { Model = m }).Part.Hash).Distinct().Count());
    }

    // What a model of another kind alone uses is no part of it: its hash must not hang on it.
    [Fact]
    public void Text_of_a_plain_model_is_that_of_before_there_were_others()
    {
        // Rows in ordinal order, numbers by their bits: 8, 0.01, 0.5 and 0.94.
        const string Expected =
            "checks\t3\t4020000000000000\t60\t3f847ae147ae147b\t3fe0000000000000\t\n" +
            "measure\tes\t0.975\t1\t\n" +
            "measure\tvar\t0.99\t1\t\n" +
            "model\tlognormal\tlognormal\tewma\t3fee147ae147ae14\t500\tzero\t\n" +
            "simulation\t100000\t1\t5\t1600000\t\\0\t\n" +
            "time-effects\texcluded\t";
        Assert.Equal(Expected, Text(new()));
        Assert.Equal(Expected, Text(new() { Model = new() { DegreesOfFreedom = 4, Margins = StudentMargins.Own, AgeWeight = 0.9, Volatility = VolatilityFilter.Garch, Jumps = s_given, Span = 100 } }));
    }

    [Fact]
    public void Drifts_of_a_plain_model_stand_where_they_stood_before() =>
        Assert.Contains("\ndrift\tA\t3fa999999999999a\t\n", Text(new() { Model = new() { Drift = DriftKind.Explicit, Drifts = Drifts(("A", 0.05)) } }), StringComparison.Ordinal);

    private static string Text(RunSettings settings) => Encoding.UTF8.GetString(SettingsText.Leaf(settings).Text);

    private static RunSettings Back(RunSettings settings) => SettingsText.Read(Text(settings));

    private static SortedDictionary<string, double> Drifts(params (string Factor, double Value)[] drifts)
    {
        var sorted = new SortedDictionary<string, double>(StringComparer.Ordinal);
        foreach (var (factor, value) in drifts) sorted[factor] = value;
        return sorted;
    }
}
