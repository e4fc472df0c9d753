using System.Text;
using RiskWorker.Storage.Feed;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests;

/// <summary>A small sound feed in a folder of its own, to be bent by a test, beside a store.</summary>
internal sealed class FeedFixture : IDisposable
{
    public static readonly DateTimeOffset Now = new(2026, 11, 28, 6, 30, 0, TimeSpan.Zero);

    private readonly DirectoryInfo _root = Directory.CreateTempSubdirectory("storage-test-");

    public FeedFixture(bool withFiles = true)
    {
        Folder = Directory.CreateDirectory(Path.Combine(_root.FullName, "feed")).FullName;
        if (!withFiles) return;
        this["books.csv"] = "book,parent,name,currency\nALL,,The firm,EUR\nEQ,ALL,Equities,EUR\nFX,ALL,,USD\n";
        this["factors.csv"] = "factor,class,shock,currency,curve,tenor_years\nALPHA,equity,lognormal,EUR,,\nUSDEUR,fx,lognormal,USD,,\nEUR-1Y,rate,normal,EUR,EUR,1\n";
        this["observations.csv"] = "date,factor,value\n" + string.Concat(Enumerable.Range(2, 5).SelectMany(d => new[]
        {
            $"2026-11-{d:00},ALPHA,{100 + d}.50\n", $"2026-11-{d:00},USDEUR,0.9{d}\n", $"2026-11-{d:00},EUR-1Y,-0.00{d}\n",
        }));
        this["instruments.csv"] = "instrument,kind,currency,factor,strike,expiry,right,style,vol,curve,carry,multiplier\n"
            + "ALPHA-S,spot,EUR,ALPHA,,,,,,,,\nALPHA-C,option,EUR,ALPHA,105,2027-03-19,call,european,0.2,EUR,0,10\nUSD,fx,USD,,,,,,,,,\n";
        this["positions.csv"] = "as_of,book,instrument,quantity,trade,market_value\n"
            + "2026-11-05,EQ,ALPHA-S,10,,\n2026-11-06,EQ,ALPHA-S,12.50,T1,1331.25\n2026-11-06,EQ,ALPHA-S,-2,T2,\n2026-11-06,FX,USD,1000,,\n2026-11-06,EQ,ALPHA-C,3,,\n";
        this["limits.csv"] = "limit,book,measure,confidence,horizon_days,amount\nfirm-var,ALL,var,0.990,1,250000\nfx-es,FX,es,0.975,10,9000\n";
        this["pnl.csv"] = "date,book,actual,hypothetical\n2026-11-05,ALL,-12.5,\n2026-11-06,ALL,7,8\n";
    }

    public string Folder { get; }

    public string StorePath => Path.Combine(_root.FullName, "out", "riskworker.db");

    /// <summary>A file's text; set null to remove it.</summary>
    public string? this[string file]
    {
        get => File.ReadAllText(Path.Combine(Folder, file));
        set
        {
            if (value is null) File.Delete(Path.Combine(Folder, file));
            else File.WriteAllText(Path.Combine(Folder, file), value, new UTF8Encoding(false));
        }
    }

    public void Bytes(string file, byte[] bytes) => File.WriteAllBytes(Path.Combine(Folder, file), bytes);

    public FeedOutcome Check() => FeedLoader.Check(Folder);

    /// <summary>The only fault of the feed.</summary>
    public FeedFault Fault() => Assert.Single(Check().Faults);

    public RiskStore Open() => RiskStore.Open(StorePath, TimeSpan.FromSeconds(20));

    public FeedOutcome Load(RiskStore store, int minute = 0) => FeedLoader.Load(Folder, store, Now.AddMinutes(minute));

    public static FeedOutcome Load(string folder, RiskStore store) => FeedLoader.Load(folder, store, Now);

    /// <summary>Loads into a store that is closed again, so that its bytes lie in one file.</summary>
    public FeedOutcome Load()
    {
        using var store = Open();
        var outcome = Load(store);
        Assert.Empty(outcome.Faults);
        return outcome;
    }

    public byte[] StoreBytes()
    {
        Assert.False(File.Exists(StorePath + "-wal"), "the store is still open, or was not closed cleanly");
        return File.ReadAllBytes(StorePath);
    }

    public void Dispose() => _root.Delete(recursive: true);
}
