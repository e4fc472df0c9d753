using RiskWorker.Reporting.Charts;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Pdf;
using RiskWorker.Reporting.Tests.Pdf;

namespace RiskWorker.Reporting.Tests.Charts;

public sealed class ChartTests
{
    [Theory]
    [InlineData(0.5)]
    [InlineData(0.05)]
    [InlineData(-0.5)]
    [InlineData(3)]
    public void Distribution_labels_each_measure_at_its_line(double lossScale)
    {
        var figure = SampleDocuments.Distribution(lossScale);
        var file = PdfRenderer.Render(SampleDocuments.Of(figure));
        PdfText.AssertInsideMargins(file);
        var lines = PdfText.Lines(file);
        Assert.Contains("VaR 99%: " + Numerals.Fixed(632 * lossScale, 1), lines);
        Assert.Contains("ES 97.5%: " + Numerals.Fixed(636 * lossScale, 1), lines);
        Assert.Contains("41 beyond", lines);
        Assert.Contains("55 beyond", lines);
        Assert.Contains("P&L, thousand EUR", lines);
    }

    [Fact]
    public void Pnl_labels_its_line_at_the_end_and_its_months()
    {
        var lines = PdfText.Lines(PdfRenderer.Render(SampleDocuments.Of(SampleDocuments.Pnl())));
        Assert.Contains("−VaR 99%", lines);
        Assert.Contains("2026-06", lines);
        Assert.Contains("P&L, thousand EUR", lines);
    }

    [Fact]
    public void Measures_cut_a_long_name_visibly_and_print_each_value()
    {
        var file = PdfRenderer.Render(SampleDocuments.Of(SampleDocuments.Measures()));
        PdfText.AssertInsideMargins(file);
        var lines = PdfText.Lines(file);
        Assert.Contains(lines, line => line.StartsWith("A book with a name", StringComparison.Ordinal) && line.EndsWith('…'));
        Assert.Contains("316.3", lines);
        Assert.Contains("20.1", lines);
    }

    [Fact]
    public void Charts_of_nothing_are_drawn_without_failing()
    {
        var file = PdfRenderer.Render(SampleDocuments.Of(
            new Figure("No day", new PnlChart([], "VaR 99%", "EUR"), 100),
            new Figure("No row", new MeasureChart([], "VaR 99%", "EUR"), 100),
            new Figure("No model", new ModelChart([], "EUR"), 100),
            new Figure("Only zeros", new ModelChart([new("VaR 99%", [new("house", 0, null, null, true)])], "EUR"), 100),
            new Figure("No scenario", new DistributionChart(0, 1, [0], 0, 0, [], "EUR"), 100),
            new Figure("Only gaps", new PnlChart([new(new DateOnly(2026, 1, 5), null, null, true)], "VaR 99%", "EUR"), 100)));
        Assert.Contains("Only gaps", PdfText.Lines(file));
    }
}
