using Microsoft.Data.Sqlite;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>Settings, options and stores that cannot be used: what is said, how it ends, and that nothing is left behind.</summary>
public sealed class BadCommandTests : IDisposable
{
    private readonly RunFolder _folder = new();

    public BadCommandTests() => _folder.WriteTinyFeed();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Measure_unknown_key_and_bad_values_come_in_one_answer()
    {
        _folder.WriteSettings("""{ "simulaton": {}, "simulation": { "scenarios": -4, "seed": "x" } }""");
        var ending = await _folder.RunAsync("measure");
        AssertRefused(ending, 3, "riskworker.json: 3 faults");
        Assert.Contains("simulaton: found an unknown key", ending.Error, StringComparison.Ordinal);
        Assert.Contains("did you mean 'simulation'?", ending.Error, StringComparison.Ordinal);
        Assert.Contains("simulation.scenarios: found -4", ending.Error, StringComparison.Ordinal);
        Assert.Contains("simulation.seed: found \"x\"", ending.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Measure_settings_that_are_no_json_name_the_place()
    {
        _folder.WriteSettings("{ \"simulation\": {\n  \"seed\": 1,,\n} }");
        AssertRefused(await _folder.RunAsync("measure"), 3, "line 2");
    }

    [Theory]
    [InlineData("--scenarios: found 'abc'", "measure", "--scenarios", "abc")]
    [InlineData("--scenarios: found 0", "measure", "--scenarios", "0")]
    [InlineData("--as-of: found '2026-02-30'", "measure", "--as-of", "2026-02-30")]
    [InlineData("--model: found 'other'", "measure", "--model", "other")]
    [InlineData("did you mean 'measure'?", "mesure")]
    [InlineData("Required argument 'ID'", "runs", "show")]
    public async Task Verb_bad_usage_names_what_was_found(string said, params string[] args)
    {
        AssertRefused(await _folder.RunAsync(args), 3, said);
        Assert.Empty(_folder.Runs);
    }

    [Fact]
    public async Task Measure_out_that_is_a_file_is_refused()
    {
        Directory.Delete(_folder.Out);
        await File.WriteAllTextAsync(_folder.Out, "a file", TestContext.Current.CancellationToken);
        var ending = await _folder.RunAsync("measure");
        File.Delete(_folder.Out);
        Directory.CreateDirectory(_folder.Out);
        AssertRefused(ending, 3, $"--out: found '{_folder.Out}', a file");
    }

    [Fact]
    public async Task Measure_store_that_is_no_store_is_left_alone()
    {
        await File.WriteAllTextAsync(_folder.Store, new string('x', 10_000), TestContext.Current.CancellationToken);
        AssertRefused(await _folder.RunAsync("measure"), 4, $"riskworker: The store '{_folder.Store}' is not a SQLite database");
        Assert.Equal(new string('x', 10_000), await File.ReadAllTextAsync(_folder.Store, TestContext.Current.CancellationToken));
        Assert.Empty(_folder.Runs);
    }

    [Fact]
    public async Task Measure_database_of_another_program_is_left_alone()
    {
        await using (var other = new SqliteConnection($"Data Source={_folder.Store};Pooling=False"))
        {
            await other.OpenAsync(TestContext.Current.CancellationToken);
            await using var command = other.CreateCommand();
            command.CommandText = "CREATE TABLE recipe (name TEXT)";
            await command.ExecuteNonQueryAsync(TestContext.Current.CancellationToken);
        }
        var before = await File.ReadAllBytesAsync(_folder.Store, TestContext.Current.CancellationToken);
        AssertRefused(await _folder.RunAsync("measure"), 4, "is a database of another program");
        Assert.Equal(before, await File.ReadAllBytesAsync(_folder.Store, TestContext.Current.CancellationToken));
    }

    /// <summary>Run ids follow from the inputs, so a run on a new store meets the folder of the old one; a full disk ends the same way.</summary>
    [Fact]
    public async Task Measure_documents_that_cannot_be_put_in_place_leave_no_half()
    {
        await _folder.MeasureAsync(0, "--scenarios", "1000");
        File.Delete(_folder.Store);
        var report = await File.ReadAllBytesAsync(Path.Combine(_folder.Runs.Single(), "limit-report.pdf"), TestContext.Current.CancellationToken);

        AssertRefused(await _folder.RunAsync("measure", "--scenarios", "1000"), 4, _folder.Runs.First());

        Assert.Equal(report, await File.ReadAllBytesAsync(Path.Combine(_folder.Runs.Single(), "limit-report.pdf"), TestContext.Current.CancellationToken));
    }

    [Fact]
    public async Task Show_report_that_cannot_be_put_in_place_leaves_no_half()
    {
        var run = (await _folder.MeasureAsync(0, "--scenarios", "1000")).GetProperty("run").GetString()!;
        var taken = Directory.CreateDirectory(Path.Combine(_folder.Config, "report.pdf")).FullName;
        AssertRefused(await _folder.RunAsync("runs", "show", run, "--pdf", taken), 4, taken);
        Assert.Empty(Directory.GetFiles(_folder.Config, "report.pdf*"));
    }

    private static void AssertRefused(Ending ending, int code, string said)
    {
        Assert.Equal(code, ending.Code);
        Assert.Contains(said, ending.Error, StringComparison.Ordinal);
        Assert.DoesNotContain("   at ", ending.Error, StringComparison.Ordinal);
        Assert.Empty(ending.Output);
    }
}
