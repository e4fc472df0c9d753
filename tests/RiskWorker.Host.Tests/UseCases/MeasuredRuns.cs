using System.Globalization;
using System.IO.Compression;
using System.Text;
using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.Tests.UseCases;

/// <summary>A store with one recorded run and three backfilled ones of a small invented firm, its documents beside it: a test takes a copy and bends that.</summary>
public sealed class MeasuredRuns : IAsyncLifetime
{
    private readonly TemporaryFolder _folder = new();

    /// <summary>Id of the recorded run.</summary>
    public string Recorded { get; private set; } = "";

    /// <summary>Id of the newest backfilled run.</summary>
    public string Backfilled { get; private set; } = "";

    public async ValueTask InitializeAsync()
    {
        WriteFeed();
        var workspace = WorkspaceIn(_folder);
        var configuration = await ConfigurationReader.ReadAsync(workspace.ConfigFolder, TestContext.Current.CancellationToken);
        var report = await Composition.UseCases(TimeProvider.System).Measure(
            new() { Workspace = workspace, Configuration = configuration, Command = ["riskworker", "measure"] }, new Progress<WorkProgress>(), TestContext.Current.CancellationToken);
        Recorded = report.Record.Run;
        using var store = RiskStore.Open(workspace.StoreFile);
        Backfilled = store.Runs.List().Last(r => r.Evidence == EvidenceKind.Backfilled).Run;
    }

    public ValueTask DisposeAsync()
    {
        _folder.Dispose();
        return ValueTask.CompletedTask;
    }

    /// <summary>A copy of store and documents in a folder of its own.</summary>
    internal TemporaryFolder Copy()
    {
        var copy = new TemporaryFolder();
        foreach (var file in Directory.EnumerateFiles(Path.Combine(_folder.Path, "out"), "*", SearchOption.AllDirectories))
        {
            var target = Path.Combine(copy.Path, Path.GetRelativePath(_folder.Path, file));
            Directory.CreateDirectory(Path.GetDirectoryName(target)!);
            File.Copy(file, target);
        }
        return copy;
    }

    internal static Workspace WorkspaceIn(TemporaryFolder folder) => new(folder.Path, Path.Combine(folder.Path, "out"), Path.Combine(folder.Path, "out", "riskworker.db"));

    /// <summary>Changes a store as somebody would who goes round its triggers.</summary>
    internal static void Tamper(TemporaryFolder folder, string sql)
    {
        using var connection = Connect(folder);
        foreach (var trigger in Rows(connection, "SELECT name FROM sqlite_master WHERE type = 'trigger'", r => r.GetString(0))) Run(connection, $"DROP TRIGGER {trigger}");
        Run(connection, "PRAGMA foreign_keys = OFF");
        Run(connection, sql);
    }

    /// <summary>The JSON of a stored record.</summary>
    internal static string RecordText(TemporaryFolder folder, string run)
    {
        using var connection = Connect(folder);
        using var json = new StreamReader(new ZLibStream(new MemoryStream(Rows(connection, $"SELECT record FROM run WHERE run = '{run}'", r => r.GetFieldValue<byte[]>(0)).Single()), CompressionMode.Decompress));
        return json.ReadToEnd();
    }

    /// <summary>A text as a store keeps it, as a literal of SQL.</summary>
    internal static string Packed(string text)
    {
        using var packed = new MemoryStream();
        using (var deflate = new ZLibStream(packed, CompressionLevel.Optimal)) deflate.Write(Encoding.UTF8.GetBytes(text));
        return $"x'{Convert.ToHexString(packed.ToArray())}'";
    }

    private static SqliteConnection Connect(TemporaryFolder folder)
    {
        var connection = new SqliteConnection($"Data Source={WorkspaceIn(folder).StoreFile};Pooling=False");
        connection.Open();
        return connection;
    }

#pragma warning disable CA2100 // The statements are the tests' own.
    private static List<T> Rows<T>(SqliteConnection connection, string sql, Func<SqliteDataReader, T> read)
    {
        using var command = connection.CreateCommand();
        command.CommandText = sql;
        using var rows = command.ExecuteReader();
        var found = new List<T>();
        while (rows.Read()) found.Add(read(rows));
        return found;
    }

    private static void Run(SqliteConnection connection, string sql)
    {
        using var command = connection.CreateCommand();
        command.CommandText = sql;
        command.ExecuteNonQuery();
    }
#pragma warning restore CA2100

    private void WriteFeed()
    {
        TinyFeed.Write(_folder);
        _folder.Write("riskworker.json", """{ "backfill": 3, "simulation": { "scenarios": 20000, "cap": 40000 }, "measures": [ { "measure": "var", "confidence": 0.99, "horizonDays": 1 }, { "measure": "es", "confidence": 0.975, "horizonDays": 10 } ] }""");
        _folder.Write("feed/books.csv", "book,parent,name,currency\nFIRM,,The firm,EUR\nDESK,FIRM,The desk,USD\n");
        _folder.Write("feed/factors.csv", "factor,class,shock,currency,calendar\nAAA,equity,lognormal,EUR,XX\nUSDEUR,fx,lognormal,USD,\n");
        _folder.Write("feed/instruments.csv", """
            instrument,kind,currency,factor,strike,expiry,right,style,vol,coupon,frequency,day_count,issue,maturity,curve
            AAA share,spot,EUR,AAA,,,,,,,,,,,
            AAA call,option,EUR,AAA,100,2027-03-19,call,european,0.3,,,,,,
            Dollars,fx,USD,,,,,,,,,,,,
            Loan,bond,EUR,,,,,,,0.03,1,ACT/ACT,2025-03-15,2031-03-15,A curve without factors

            """);
        var days = new[] { "2026-11-24", "2026-11-25", "2026-11-26", "2026-11-27" };
        _folder.Write("feed/positions.csv", "as_of,book,instrument,quantity\n" + string.Concat(days.Select((day, i) => $"{day},FIRM,AAA share,{1000 + i}\n{day},DESK,AAA call,-{50 + i}\n{day},DESK,Dollars,90000\n{day},FIRM,Loan,3\n")));
        _folder.Write("feed/limits.csv", "limit,book,measure,confidence,horizon_days,amount\nfirm,FIRM,var,0.99,1,100000\ndesk,DESK,var,0.95,1,2000\n");
        _folder.Write("feed/pnl.csv", "date,book,actual\n" + string.Concat(days.Select((day, i) => $"{day},FIRM,{-500 * i}\n")));
        _folder.Write("feed/holidays.csv", "calendar,date\nXX,2026-12-25\n");
        _folder.Write("feed/adjustments.csv", "factor,date,ratio,reason\nAAA,2026-10-01,0.5,split\n");
        var prices = File.ReadAllLines(Path.Combine(_folder.Path, "feed/observations.csv"));
        _folder.Write("feed/observations.csv", string.Join('\n', prices.Concat(prices.Skip(1).Select((row, i) => string.Create(CultureInfo.InvariantCulture, $"{row[..10]},USDEUR,{0.9 + (0.001 * (i * 7 % 11))}")))) + "\n");
    }
}
