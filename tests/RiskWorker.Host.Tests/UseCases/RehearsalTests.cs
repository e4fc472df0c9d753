using System.Text;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Tests.UseCases;

public sealed class RehearsalTests
{
    // A rehearsal that fails half-way would still be harmless, and useless.
    [Fact]
    public void Run_goes_all_the_way_to_a_report_of_figures()
    {
        var report = Rehearsal.Run();
        Assert.StartsWith("%PDF", Encoding.Latin1.GetString(report, 0, 4), StringComparison.Ordinal);
        using var document = UglyToad.PdfPig.PdfDocument.Open(report);
        Assert.True(document.NumberOfPages >= 3, $"{document.NumberOfPages} pages: a failed run has fewer");
    }
}
