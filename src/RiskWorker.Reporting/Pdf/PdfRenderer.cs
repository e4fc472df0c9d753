using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Drawing;
using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>Renders a document to PDF. The same document gives the same bytes under any culture, time zone and thread count.</summary>
public static class PdfRenderer
{
    /// <summary>Lays the document out on A4 pages and returns the file.</summary>
    /// <param name="document">The document.</param>
    /// <returns>The bytes of a PDF with embedded fonts, vector charts and selectable text. No PDF/A or PDF/UA conformance is claimed.</returns>
    public static byte[] Render(ReportDocument document)
    {
        ArgumentNullException.ThrowIfNull(document);
        using var typesetter = new Typesetter();
        var pages = new Paginator(PageGeometry.BodyHeight).Place(new BlockLayout(typesetter).Layout(document));
        using var stream = new MemoryStream();
        using (var pdf = SKDocument.CreatePdf(stream, Properties(document)))
        {
            for (var i = 0; i < pages.Count; i++)
            {
                var canvas = pdf.BeginPage(PageGeometry.Width, PageGeometry.Height);
                PageFurniture.Draw(canvas, typesetter, document, i + 1, pages.Count);
                foreach (var (fragment, y) in pages[i])
                    fragment.Draw(canvas, new SKPoint(PageGeometry.Side, PageGeometry.BodyTop + y));
                pdf.EndPage();
            }

            pdf.Close();
        }

        return stream.ToArray();
    }

    // No dates: Skia would stamp the machine's UTC offset on them. No PDF/A: that mode writes random identifiers.
    private static SKDocumentPdfMetadata Properties(ReportDocument document) => new(rasterDpi: 300)
    {
        Title = document.Title,
        Subject = document.Running,
        Producer = "RiskWorker",
        Creator = "RiskWorker",
    };
}
