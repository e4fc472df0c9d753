using System.Globalization;
using System.Runtime.InteropServices;
using RiskWorker.Reporting.Pdf;
using RiskWorker.Reporting.Reports;
using RiskWorker.Reporting.Tests.Reports;

namespace RiskWorker.Reporting.Tests.Pdf;

/// <summary>Alone in the process: these tests change the time zone that native code sees.</summary>
[CollectionDefinition(nameof(SameBytesTests), DisableParallelization = true)]
[Collection(nameof(SameBytesTests))]
public sealed partial class SameBytesTests
{
    [Fact]
    public void Render_twice_gives_the_same_bytes() => Assert.Equal(Report(), Report());

    [Fact]
    public void Render_under_two_cultures_gives_the_same_bytes()
    {
        var expected = Report();
        var before = CultureInfo.CurrentCulture;
        try
        {
            CultureInfo.CurrentCulture = Foreign();
            Assert.Equal("1.234,5", 1234.5.ToString("N1", CultureInfo.CurrentCulture));
            Assert.Equal(expected, Report());
        }
        finally
        {
            CultureInfo.CurrentCulture = before;
        }
    }

    [Theory]
    [InlineData("Asia/Tokyo")]
    [InlineData("America/St_Johns")]
    public void Render_in_another_time_zone_gives_the_same_bytes(string zone)
    {
        var expected = Report();
        var before = Environment.GetEnvironmentVariable("TZ");
        try
        {
            SetZone(zone);
            Assert.NotEqual(TimeSpan.Zero, TimeZoneInfo.Local.BaseUtcOffset);
            Assert.Equal(expected, Report());
        }
        finally
        {
            SetZone(before ?? "UTC");
        }
    }

    [Fact]
    public void Render_on_many_threads_gives_the_same_bytes()
    {
        var expected = Report();
        var files = new byte[6][];
        Parallel.For(0, files.Length, i => files[i] = Report());
        Assert.All(files, file => Assert.Equal(expected, file));
    }

    private static byte[] Report() => PdfRenderer.Render(LimitReport.Build(new SampleRun().Build()));

    // The invariant mode knows no named culture, so one is made that differs in all that text can show.
    private static CultureInfo Foreign()
    {
        var culture = (CultureInfo)CultureInfo.InvariantCulture.Clone();
        culture.NumberFormat.NumberDecimalSeparator = ",";
        culture.NumberFormat.NumberGroupSeparator = ".";
        culture.NumberFormat.NegativeSign = "~";
        culture.NumberFormat.PercentSymbol = "pc";
        culture.DateTimeFormat.ShortDatePattern = "dd.MM.yyyy";
        culture.DateTimeFormat.DateSeparator = ".";
        culture.DateTimeFormat.TimeSeparator = ".";
        culture.DateTimeFormat.AbbreviatedMonthNames = ["a", "b", "c", "d", "e", "f", "g", "h", "i", "j", "k", "l", ""];
        return culture;
    }

    // Native code reads the process's own environment, which the runtime's copy does not reach.
    private static void SetZone(string zone)
    {
        Environment.SetEnvironmentVariable("TZ", zone);
        Assert.Equal(0, SetNative("TZ", zone, 1));
        ReadZone();
        TimeZoneInfo.ClearCachedData();
    }

    [LibraryImport("libc", EntryPoint = "setenv", StringMarshalling = StringMarshalling.Utf8)]
    private static partial int SetNative(string name, string value, int overwrite);

    [LibraryImport("libc", EntryPoint = "tzset")]
    private static partial void ReadZone();
}
