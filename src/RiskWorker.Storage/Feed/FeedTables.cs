using RiskWorker.Storage.Feed.Rows;
using RiskWorker.Storage.Sqlite.Writers;

namespace RiskWorker.Storage.Feed;

/// <summary>The files of a feed: for each its parser and where its rows go.</summary>
internal static class FeedTables
{
    /// <summary>Fresh tables for one load, in the order in which faults are told.</summary>
    public static IReadOnlyList<FeedTable> ForOneLoad()
    {
        var digests = new PositionDigests();
        return
        [
            Whole(BookParser.Format, _ => new BookParser(), "book", keys: 1),
            Whole(FactorParser.Format, _ => new FactorParser(), "factor", keys: 1),
            new FeedTable<ObservationRow>(ObservationParser.Format, _ => new ObservationParser(), (connection, load) => new ObservationWriter(connection, load)),
            new FeedTable<string?[]>(InstrumentParser.Format, warnings => new InstrumentParser(warnings), (connection, _) => new TableWriter(connection,
                new("instrument", 1, ["instrument", "kind", "currency", "terms", "issuer", "lot", "daily_volume"], KeepsMissing: true))),
            new FeedTable<PositionRow>(PositionParser.Format, _ => new PositionParser(), (connection, _) => new PositionWriter(connection, digests), row => digests.Add(row)),
            Whole(LimitParser.Format, _ => new LimitParser(), "risk_limit", keys: 1),
            new FeedTable<ProfitRow>(ProfitParser.Format, _ => new ProfitParser(), (connection, load) => new ProfitWriter(connection, load)),
            Whole(HolidayParser.Format, _ => new HolidayParser(), "holiday", keys: 2),
            Whole(AdjustmentParser.Format, _ => new AdjustmentParser(), "adjustment", keys: 2),
            Whole(CovarianceParser.Format, _ => new CovarianceParser(), "covariance", keys: 2),
            Whole(StressParser.Format, _ => new StressParser(), "stress", keys: 2),
        ];
    }

    /// <summary>A small file that replaces its table whole; the table's columns are the file's.</summary>
    private static FeedTable<string?[]> Whole(FileFormat format, Func<WarningLog, IRowParser<string?[]>> parser, string table, int keys) =>
        new(format, parser, (connection, _) => new TableWriter(connection, new(table, keys, [.. format.Columns.Select(c => c.Name)])));
}
