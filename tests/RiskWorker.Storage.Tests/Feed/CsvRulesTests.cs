using System.Text;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Feed;

public sealed class CsvRulesTests
{
    // RFC 4180, section 2, rules 5 to 7.
    [Theory]
    [InlineData("\"Rates, and \"\"more\"\"\"", "Rates, and \"more\"")]
    [InlineData("\"two\nlines\"", "two\nlines")]
    [InlineData("\"two\r\nlines\"", "two\r\nlines")]
    [InlineData("\"\"\"\"", "\"")]
    [InlineData("\"\"", "ALL")]
    [InlineData("Zürich 株", "Zürich 株")]
    [InlineData("=1+1", "=1+1")]
    public void Load_quoted_cell_is_read_without_its_quotation_marks(string cell, string name)
    {
        using var fixture = new FeedFixture { ["books.csv"] = $"book,parent,name,currency\nALL,,{cell},EUR\n" };
        using var store = fixture.Open();

        Assert.Empty(fixture.Load(store).Faults);

        Assert.Equal(name, new SnapshotReader(store).Take(new(2026, 11, 6), new RunSettings(), "m").Books[0].DisplayName);
    }

    [Theory]
    [InlineData("ALL,,The \"firm\",EUR\n", 2, "name")]
    [InlineData("ALL,,\"The\" firm,EUR\n", 2, "name")]
    [InlineData("ALL,,\"The \"firm\",EUR\n", 2, null)]
    [InlineData("ALL,,\"\"\",EUR\nB,ALL,,EUR\n", 2, null)]
    [InlineData("ALL,,\"The firm,EUR\nB,ALL,,EUR\n", 2, null)]
    public void Check_quotation_marks_that_do_not_pair_up_are_a_fault_of_their_row(string rows, int line, string? column)
    {
        using var fixture = new FeedFixture { ["books.csv"] = "book,parent,name,currency\n" + rows };

        var fault = fixture.Fault();

        Assert.Equal((line, column), (fault.Line, fault.Column));
    }

    [Fact]
    public void Check_lines_are_right_after_and_inside_quoted_line_breaks()
    {
        using var fixture = new FeedFixture
        {
            ["limits.csv"] = "reason,limit,book,measure,confidence,horizon_days,amount\r\n\"three\r\nlong\r\nlines\",L,ALL,var,0.99,1,none\r\nshort,M,ALL,var,0.99,1,no\r\n",
        };

        Assert.Equal([(4, "none"), (5, "no")], fixture.Check().Faults.Select(f => ((int)f.Line, f.Found)));
    }

    [Fact]
    public void Check_quotation_mark_left_open_over_a_whole_file_is_one_fault_at_its_row()
    {
        using var fixture = new FeedFixture();
        fixture["observations.csv"] = "date,factor,value\n2026-11-06,\"ALPHA,1\n" + string.Concat(Enumerable.Repeat("2026-11-07,ALPHA,1\n", 1_000_000));

        Assert.Equal(2, fixture.Fault().Line);
    }

    [Theory]
    [InlineData(new byte[] { 0xFF }, "byte 0xFF")]
    [InlineData(new byte[] { 0xC3, 0x28 }, "byte 0xC3")]
    [InlineData(new byte[] { 0xED, 0xA0, 0x80 }, "byte 0xED")]
    [InlineData(new byte[] { 0xE2, 0x82 }, "byte 0xE2")]
    public void Check_text_that_is_not_utf8_names_the_line(byte[] bad, string found)
    {
        using var fixture = new FeedFixture();
        fixture.Bytes("observations.csv", [.. "date,factor,value\n2026-11-06,Ä,1\n2026-11-06,"u8, .. bad, .. "B,1\n2026-11-06,C,1\n"u8]);

        var fault = fixture.Check().Faults[0];

        Assert.Equal(("observations.csv", 3, found, "text in UTF-8"), (fault.File, fault.Line, fault.Found, fault.Expected));
    }

    [Fact]
    public void Check_file_in_utf16_is_refused()
    {
        using var fixture = new FeedFixture();
        fixture.Bytes("books.csv", [.. Encoding.Unicode.GetPreamble(), .. Encoding.Unicode.GetBytes("book,currency\nALL,EUR\n")]);

        Assert.Equal((1, "byte 0xFF"), (fixture.Check().Faults[0].Line, fixture.Check().Faults[0].Found));
    }

    [Fact]
    public void Check_character_cut_by_the_edge_of_a_buffer_is_no_fault()
    {
        // 65,536 bytes are looked at together; the two bytes of 'ä' lie on either side of every such edge for one of the two lengths.
        foreach (var pad in new[] { "", "x" })
        {
            using var fixture = new FeedFixture { ["books.csv"] = "book,name,currency\nALL,All,EUR\n" + string.Concat(Enumerable.Range(0, 300).Select(i => $"B{i:000}{pad},{new string('ä', 1000)},EUR\n")) };

            Assert.Empty(fixture.Check().Faults);
        }
    }

    [Fact]
    public void Check_missing_rates_of_options_of_every_kind_are_one_warning()
    {
        using var fixture = new FeedFixture();
        fixture["instruments.csv"] = "instrument,kind,currency,factor,strike,expiry,right,style,vol,curve,carry,payoff,notional,barrier,barrier_kind,monitoring,issue,average,fixings\n"
            + "OPT,option,EUR,ALPHA,100,2027-03-19,call,american,0.2,,0,,,,,,,,\n"
            + "DIG,digital,EUR,ALPHA,100,2027-03-19,call,,0.2,0,,cash,10,,,,,,\n"
            + "BAR,barrier,EUR,ALPHA,100,2027-03-19,call,,0.2,,,,,80,down-in,daily,2026-11-02,,\n"
            + "ASI,asian,EUR,ALPHA,100,2027-03-19,call,,0.2,,,,,,,,,geometric,2027-03-19\n"
            + "LOO,lookback,EUR,ALPHA,,2027-03-19,call,,0.2,,,,,,,daily,2026-11-02,,\n"
            + "ALL,lookback,EUR,ALPHA,,2027-03-19,call,,0.2,0,EUR,,,,,daily,2026-11-02,,\n"
            + "FWD,forward,EUR,ALPHA,100,2027-03-19,,,,,,,,,,,,,\nS,spot,EUR,ALPHA,,,,,,,,,,,,,,,\n";
        var checkedFeed = fixture.Check();

        Assert.DoesNotContain(checkedFeed.Faults, f => f.File == "instruments.csv");
        Assert.Equal(new Finding(FindingSeverity.Warning, "assumed-zero-rate", "instruments.csv", "5 options have no curve or no carry, which counts as 0: ASI, BAR, DIG, LOO, OPT."), Assert.Single(checkedFeed.Warnings));
    }

    [Fact]
    public void Check_unknown_columns_files_terms_and_missing_rates_are_warnings_with_their_first_ten_names()
    {
        using var fixture = new FeedFixture();
        fixture["books.csv"] = "book,parent,name,currency,owner\nALL,,,EUR,me\n";
        fixture["limit.csv"] = "limit\n";
        fixture["instruments.csv"] = "instrument,kind,currency,factor,strike,expiry,right,style,vol\n"
            + string.Concat(Enumerable.Range(1, 12).Reverse().Select(i => $"O{i:00},option,EUR,ALPHA,100,2027-03-19,call,european,0.2\n")) + "S,spot,EUR,ALPHA,100,,,,\n";

        var warnings = fixture.Check().Warnings;

        Assert.Equal(
            [
                new(FindingSeverity.Warning, "unknown-file", "feed", "1 file is not part of the feed and ignored: limit.csv."),
                new(FindingSeverity.Warning, "unknown-column", "books.csv", "1 column is not part of this file's format and ignored: owner."),
                new(FindingSeverity.Warning, "assumed-zero-rate", "instruments.csv", "12 options have no curve or no carry, which counts as 0: O01, O02, O03, O04, O05, O06, O07, O08, O09, O10, …."),
                new Finding(FindingSeverity.Warning, "unused-term", "instruments.csv", "1 term is not used by the instrument's kind and ignored: S (strike)."),
            ],
            warnings);
        using var store = fixture.Open();
        fixture.Load(store);
        Assert.Equal(warnings.OrderBy(w => w.Subject + w.Code, StringComparer.Ordinal), store.FeedWarnings.OrderBy(w => w.Subject + w.Code, StringComparer.Ordinal));
    }
}
