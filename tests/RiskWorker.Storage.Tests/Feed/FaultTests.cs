namespace RiskWorker.Storage.Tests.Feed;

public sealed class FaultTests
{
    private const string Factors = "factor,class,shock,currency,proxy,beta,tenor_years,liquidity_days\n";
    private const string Limits = "limit,book,measure,confidence,horizon_days,amount,basis,reference_book,warn_at,valid_from,valid_to\n";
    private const string Instruments = "instrument,kind,currency,factor,strike,expiry,right,style,vol,curve,carry,lot\n";
    private const string Option = "O,option,EUR,A,100,2027-03-19,call,european,0.2,0,0,";

    [Theory]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A,1,5\n", 2, null, "4 cells")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A\n", 2, null, "2 cells")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A,\"1,5\"\n", 2, "value", "1,5")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A,1e400\n", 2, "value", "1e400")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A,NaN\n", 2, "value", "NaN")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A,-Infinity\n", 2, "value", "-Infinity")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A,\n", 2, "value", "")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A, 1\n", 2, "value", " 1")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A,0x10\n", 2, "value", "0x10")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A,1\n06.11.2026,B,1\n", 3, "date", "06.11.2026")]
    [InlineData("observations.csv", "date,factor,value\n2026-02-30,A,1\n", 2, "date", "2026-02-30")]
    [InlineData("observations.csv", "date,factor,value\n0001-01-01,A,1\n", 2, "date", "0001-01-01")]
    [InlineData("observations.csv", "date,factor,value\n9999-12-31,A,1\n", 2, "date", "9999-12-31")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,,1\n", 2, "factor", "")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A ,1\n", 2, "factor", "A ")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A\0B,1\n", 2, "factor", "A\\u0000B")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-06,A,1\n2026-11-06,A,1\n", 3, "factor", "A")]
    [InlineData("observations.csv", "date,factor\n2026-11-06,A\n", 1, "value", "")]
    [InlineData("observations.csv", "date,factor,value,value\n", 1, "value", "value")]
    [InlineData("observations.csv", "date,factor,value\n", 0, null, "no row below the header")]
    [InlineData("observations.csv", "", 1, null, "")]
    [InlineData("positions.csv", "as_of,book,instrument,quantity,market_value\n2026-11-06,B,I,1,ten\n", 2, "market_value", "ten")]
    [InlineData("books.csv", "book,parent,name,currency\nALL,,All,EUR\nALL,,All,EUR\n", 3, "book", "ALL")]
    [InlineData("books.csv", "book,parent,name,currency\nALL,,All,\n", 2, "currency", "")]
    [InlineData("factors.csv", Factors + "A,stock,lognormal,,,,,\n", 2, "class", "stock")]
    [InlineData("factors.csv", Factors + "A,Equity,lognormal,,,,,\n", 2, "class", "Equity")]
    [InlineData("factors.csv", Factors + "A,equity,log,,,,,\n", 2, "shock", "log")]
    [InlineData("factors.csv", Factors + "A,fx,lognormal,,,,,\n", 2, "currency", "")]
    [InlineData("factors.csv", Factors + "A,fx,lognormal,USD,,,,\nB,fx,lognormal,USD,,,,\n", 3, "currency", "USD")]
    [InlineData("factors.csv", Factors + "A,equity,lognormal,,B,,,\n", 2, "beta", "")]
    [InlineData("factors.csv", Factors + "A,equity,lognormal,,,1.1,,\n", 2, "proxy", "")]
    [InlineData("factors.csv", Factors + "A,equity,lognormal,,A,1.1,,\n", 2, "proxy", "A")]
    [InlineData("factors.csv", Factors + "A,rate,normal,,,,-1,\n", 2, "tenor_years", "-1")]
    [InlineData("factors.csv", Factors + "A,rate,normal,,,,,2.5\n", 2, "liquidity_days", "2.5")]
    [InlineData("factors.csv", Factors + "A,rate,normal,,,,,\nA,rate,normal,,,,,\n", 3, "factor", "A")]
    [InlineData("limits.csv", Limits + "L,ALL,cvar,0.99,1,1,,,,,\n", 2, "measure", "cvar")]
    [InlineData("limits.csv", Limits + "L,ALL,var,99,1,1,,,,,\n", 2, "confidence", "99")]
    [InlineData("limits.csv", Limits + "L,ALL,var,1,1,1,,,,,\n", 2, "confidence", "1")]
    [InlineData("limits.csv", Limits + "L,ALL,var,0.99,0,1,,,,,\n", 2, "horizon_days", "0")]
    [InlineData("limits.csv", Limits + "L,ALL,var,0.99,1,0,,,,,\n", 2, "amount", "0")]
    [InlineData("limits.csv", Limits + "L,ALL,var,0.99,1,1,share,,,,\n", 2, "basis", "share")]
    [InlineData("limits.csv", Limits + "L,ALL,var,0.99,1,1,book,,,,\n", 2, "reference_book", "")]
    [InlineData("limits.csv", Limits + "L,ALL,var,0.99,1,1,,,1.5,,\n", 2, "warn_at", "1.5")]
    [InlineData("limits.csv", Limits + "L,ALL,var,0.99,1,1,,,,2026-12-31,2026-01-01\n", 2, "valid_to", "2026-01-01")]
    [InlineData("limits.csv", Limits + "L,ALL,var,0.99,1,1,,,,,\nL,ALL,var,0.99,1,1,,,,,\n", 3, "limit", "L")]
    [InlineData("instruments.csv", Instruments + "O,share,EUR,A,,,,,,,,\n", 2, "kind", "share")]
    [InlineData("instruments.csv", Instruments + "O,option,EUR,A,-1,2027-03-19,call,european,0.2,0,0,\n", 2, "strike", "-1")]
    [InlineData("instruments.csv", Instruments + "O,option,EUR,A,100,2027-03-19,up,european,0.2,0,0,\n", 2, "right", "up")]
    [InlineData("instruments.csv", Instruments + "O,option,EUR,A,100,2027-03-19,call,bermudan,0.2,0,0,\n", 2, "style", "bermudan")]
    [InlineData("instruments.csv", Instruments + "O,option,EUR,A,100,2027-03-19,call,european,0.2,\"0,05\",0,\n", 2, "curve", "0,05")]
    [InlineData("instruments.csv", Instruments + "O,option,EUR,A,100,2027-03-19,call,european,0.2,0,1e400,\n", 2, "carry", "1e400")]
    [InlineData("instruments.csv", Instruments + Option + "0\n", 2, "lot", "0")]
    [InlineData("instruments.csv", Instruments + Option + "\n" + Option + "\n", 3, "instrument", "O")]
    [InlineData("instruments.csv", Instruments + "S,spot,EUR,,,,,,,,,\n", 2, "factor", "")]
    [InlineData("pnl.csv", "date,book,actual\n2026-11-06,ALL,1\n2026-11-06,ALL,1\n", 3, "book", "ALL")]
    [InlineData("adjustments.csv", "factor,date,ratio\nA,2026-11-06,0\n", 2, "ratio", "0")]
    [InlineData("adjustments.csv", "factor,date,ratio\nA,2026-11-06,2\nA,2026-11-06,2\n", 3, "factor", "A")]
    [InlineData("covariance.csv", "factor,other,value\nA,B,0.1\nB,A,0.2\n", 3, "value", "0.2")]
    [InlineData("covariance.csv", "factor,other,value\nA,A,-0.1\n", 2, "value", "-0.1")]
    [InlineData("stress.csv", "scenario,target,shock,mode\nS,equity,-0.1,percent\n", 2, "mode", "percent")]
    public void Check_bad_cell_names_file_line_column_and_what_was_found(string file, string text, int line, string? column, string found)
    {
        using var fixture = new FeedFixture { [file] = text };

        var fault = fixture.Fault();

        Assert.Equal((file, line, column, found), (fault.File, fault.Line, fault.Column, fault.Found));
        Assert.NotEmpty(fault.Expected);
    }

    [Theory]
    [InlineData("covariance.csv", "factor,other,value\nA,B,0.1\nB,A,0.10\n")]
    [InlineData("holidays.csv", "calendar,date\nTARGET,2026-12-25\nTARGET,2026-12-25\n")]
    [InlineData("limits.csv", "limit,book,measure,confidence,horizon_days,amount,valid_to\nL,ALL,es,0.975,10,1.5e6,9999-12-31\n")]
    [InlineData("limits.csv", "limit,book,measure,confidence,horizon_days,amount\n")]
    [InlineData("positions.csv", "as_of,book,instrument,quantity\n2026-11-06,EQ,ALPHA-S,1\n2026-11-06,EQ,ALPHA-S,1\n")]
    [InlineData("observations.csv", "\uFEFFdate,factor,value\n2026-11-06,ALPHA,+1.5E2\n")]
    [InlineData("observations.csv", "value,factor,date\r\n.5,ALPHA,2026-11-06\r\n\r\n-0,USDEUR,2026-11-06")]
    [InlineData("instruments.csv", Instruments + "O,option,EUR,A,100,2027-03-19,call,european,0.2,EUR-1Y,3M-EUR,\n")]
    public void Check_unusual_but_sound_file_has_no_fault(string file, string text)
    {
        using var fixture = new FeedFixture { [file] = text };

        Assert.Empty(fixture.Check().Faults);
    }

    [Fact]
    public void Check_tells_all_faults_of_all_files_at_once_and_counts_beyond_fifty()
    {
        using var fixture = new FeedFixture();
        fixture["observations.csv"] = "date,factor,value\n" + string.Concat(Enumerable.Range(1, 62).Select(i => $"2026-11-06,F{i},x\n"));
        fixture["books.csv"] = "book,currency\nALL,EUR\nALL,EUR\n";
        fixture["factors.csv"] = null;

        var outcome = fixture.Check();

        Assert.Equal(["factors.csv", "books.csv", .. Enumerable.Repeat("observations.csv", 50)], outcome.Faults.Select(f => f.File));
        Assert.Equal("observations.csv: and 12 more.", outcome.Sentences().Last());
        Assert.Equal("observations.csv, line 2, column value: found 'x', expected a number with '.' as decimal point.", outcome.Sentences().First(s => s.StartsWith("obs", StringComparison.Ordinal)));
    }

    [Fact]
    public void Check_several_bad_cells_of_one_row_are_each_told()
    {
        using var fixture = new FeedFixture { ["observations.csv"] = "date,factor,value\nyesterday,,dear\n" };

        Assert.Equal(["date", "factor", "value"], fixture.Check().Faults.Select(f => f.Column));
    }

    [Fact]
    public void Check_missing_folder_is_a_fault()
    {
        using var fixture = new FeedFixture();
        Directory.Delete(fixture.Folder, recursive: true);

        Assert.Equal("no such folder", fixture.Fault().Found);
    }
}
