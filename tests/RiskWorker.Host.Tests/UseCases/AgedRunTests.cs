using System.Text.Json;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.Tests.UseCases;

/// <summary>A run whose model moves the valuation date, from CSV to <c>results.json</c> and back.</summary>
public sealed class AgedRunTests : IDisposable
{
    private readonly TemporaryFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    // A bond that matures on the fifth day is worth 103 in cash whatever happens: its loss at ten days is known, and no surface stands for anything.
    [Fact]
    public async Task Measure_and_verify_an_aged_book()
    {
        WriteFeed("horizon");
        var run = await MeasureAsync();

        using var results = JsonDocument.Parse(await File.ReadAllTextAsync(Path.Combine(_folder.Path, "out", "2026-11-27", run, "results.json"), TestContext.Current.CancellationToken));
        var findings = results.RootElement.GetProperty("findings").EnumerateArray().ToDictionary(f => f.GetProperty("code").GetString()!, f => f.GetProperty("message").GetString()!, StringComparer.Ordinal);
        Assert.StartsWith("2 lines expire, pay or are fixed inside 10 days: AAA call (expires on 2026-12-02), Loan (pays on 2026-12-04)", findings["line-expires"], StringComparison.Ordinal);
        Assert.Equal(10 * ((103 * Math.Exp(-0.02 * 7 / 365)) - 103), VarOf(results.RootElement, "LOANS"), 1e-9);
        // The call ends three days in: 1,000 sold lose at most what the share's rise in that time makes of them.
        Assert.InRange(VarOf(results.RootElement, "CALLS"), 1, double.MaxValue);

        foreach (var threads in new[] { 1, 3 })
        {
            var report = await Composition.UseCases(TimeProvider.System).Verify(new VerifyRequest(MeasuredRuns.WorkspaceIn(_folder), run, threads), new Progress<WorkProgress>(), TestContext.Current.CancellationToken);
            Assert.Equal(ExitCode.Done, report.ExitCode);
            Assert.Empty(report.Differences);
        }
    }

    // Each model has its own valuation date: the loan is cash in ten days for the one that moves it.
    [Fact]
    public async Task Challenger_ages_beside_a_model_of_record_that_does_not()
    {
        WriteFeed(null);
        _folder.Write("riskworker.json", """
            { "models": { "m": {}, "aged": { "ageing": "horizon" } }, "record": "m", "challengers": [ "aged" ], "simulation": { "scenarios": 20000 },
              "measures": [ { "measure": "var", "confidence": 0.99, "horizonDays": 10 } ] }
            """);
        var run = await MeasureAsync();

        using var results = JsonDocument.Parse(await File.ReadAllTextAsync(Path.Combine(_folder.Path, "out", "2026-11-27", run, "results.json"), TestContext.Current.CancellationToken));
        Assert.Contains(results.RootElement.GetProperty("findings").EnumerateArray(), f => f.GetProperty("code").GetString() == "line-expires");
        Assert.Equal(0, VarOf(results.RootElement, "LOANS"), 1e-9);
        var aged = results.RootElement.GetProperty("models").EnumerateArray().Single();
        Assert.Equal(10 * ((103 * Math.Exp(-0.02 * 7 / 365)) - 103), VarOf(aged, "LOANS"), 1e-9);
        var report = await Composition.UseCases(TimeProvider.System).Verify(new VerifyRequest(MeasuredRuns.WorkspaceIn(_folder), run, 2), new Progress<WorkProgress>(), TestContext.Current.CancellationToken);
        Assert.Equal(ExitCode.Done, report.ExitCode);
    }

    // The snapshot of a run without ageing is that of versions that knew none.
    [Fact]
    public async Task Ageing_changes_the_snapshot_and_its_absence_does_not()
    {
        WriteFeed("none");
        await MeasureAsync();
        var first = Snapshot();
        WriteFeed(null);
        await MeasureAsync();
        Assert.Equal(first, Snapshot());
        WriteFeed("horizon");
        await MeasureAsync();
        Assert.NotEqual(first, Snapshot());
    }

    private static double VarOf(JsonElement results, string book) => results.GetProperty("nodes").EnumerateArray().Single(n => n.GetProperty("book").GetString() == book)
        .GetProperty("measures").EnumerateArray().Single(m => m.GetProperty("horizonDays").GetInt32() == 10).GetProperty("value").GetDouble();

    private async Task<string> MeasureAsync()
    {
        var workspace = MeasuredRuns.WorkspaceIn(_folder);
        var configuration = await ConfigurationReader.ReadAsync(workspace.ConfigFolder, TestContext.Current.CancellationToken);
        var report = await Composition.UseCases(TimeProvider.System).Measure(
            new() { Workspace = workspace, Configuration = configuration, Command = ["riskworker", "measure"] }, new Progress<WorkProgress>(), TestContext.Current.CancellationToken);
        return report.Record.Run;
    }

    private string Snapshot()
    {
        using var store = RiskStore.Open(MeasuredRuns.WorkspaceIn(_folder).StoreFile);
        return store.Runs.List()[^1].Snapshot;
    }

    private void WriteFeed(string? ageing)
    {
        TinyFeed.Write(_folder);
        var key = ageing is null ? "" : $", \"ageing\": \"{ageing}\"";
        _folder.Write("riskworker.json", $$"""{ "models": { "m": { "kind": "lognormal"{{key}} } }, "simulation": { "scenarios": 40000 }, "measures": [ { "measure": "var", "confidence": 0.99, "horizonDays": 10 } ] }""");
        _folder.Write("feed/books.csv", "book,parent,name,currency\nFIRM,,The firm,EUR\nLOANS,FIRM,Loans,EUR\nCALLS,FIRM,Calls,EUR\n");
        _folder.Write("feed/instruments.csv", """
            instrument,kind,currency,factor,strike,expiry,right,style,vol,coupon,frequency,day_count,issue,maturity,curve
            AAA call,option,EUR,AAA,90,2026-12-02,call,european,0.3,,,,,,0.01
            Loan,bond,EUR,,,,,,,0.03,1,30/360,2025-12-04,2026-12-04,0.02

            """);
        _folder.Write("feed/positions.csv", "as_of,book,instrument,quantity\n2026-11-27,CALLS,AAA call,-1000\n2026-11-27,LOANS,Loan,10\n");
    }
}
