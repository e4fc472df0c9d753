using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Pdf;
using UglyToad.PdfPig;

namespace RiskWorker.Reporting.Tests.Pdf;

public sealed class PdfRendererTests
{
    [Fact]
    public void Render_every_block_keeps_all_letters_inside_the_margins() =>
        PdfText.AssertInsideMargins(PdfRenderer.Render(SampleDocuments.Everything()));

    [Fact]
    public void Render_several_pages_heads_and_numbers_each()
    {
        var pages = PdfText.Pages(PdfRenderer.Render(SampleDocuments.Everything()));
        Assert.Equal(3, pages.Count);
        Assert.All(pages, (page, i) =>
        {
            Assert.Equal("Sample report", page[0]);
            Assert.Equal("As of 2026-11-27 · run 4f1c", page[1]);
            Assert.Contains("Invented figures.", page);
            Assert.Contains($"page {i + 1} of 3", page);
        });
    }

    [Fact]
    public void Render_document_without_blocks_is_one_page()
    {
        var pages = PdfText.Pages(PdfRenderer.Render(SampleDocuments.Of()));
        Assert.Contains("page 1 of 1", Assert.Single(pages));
    }

    [Fact]
    public void Render_500_rows_shows_each_once_in_order_below_a_repeated_head()
    {
        var pages = PdfText.Pages(PdfRenderer.Render(SampleDocuments.Of(new Heading("Long"), SampleDocuments.LongTable(500, 500))));
        Assert.InRange(pages.Count, 8, 20);
        Assert.All(pages, page =>
        {
            Assert.Single(page, "Book");
            Assert.Single(page, "thousand EUR");
        });
        var rows = pages.SelectMany(page => page).Where(line => line.StartsWith("Row ", StringComparison.Ordinal));
        Assert.Equal(Enumerable.Range(0, 500).Select(i => $"Row {i}"), rows);
    }

    [Fact]
    public void Render_group_that_fits_stays_on_one_page()
    {
        var pages = PdfText.Pages(PdfRenderer.Render(SampleDocuments.Of(SampleDocuments.LongTable(200, 7))));
        Assert.True(pages.Count > 3);
        for (var first = 0; first < 200; first += 7)
        {
            var holders = Enumerable.Range(first, Math.Min(7, 200 - first)).Select(i => pages.ToList().FindIndex(page => page.Contains($"Row {i}")));
            Assert.Single(holders.Distinct());
        }
    }

    [Fact]
    public void Render_titled_group_that_breaks_repeats_its_title()
    {
        var table = SampleDocuments.LongTable(100, 100);
        var titled = table with { Groups = [table.Groups[0] with { Title = "Figures in thousand NOK" }] };
        var pages = PdfText.Pages(PdfRenderer.Render(SampleDocuments.Of(titled)));
        Assert.True(pages.Count > 1);
        Assert.All(pages, page => Assert.Single(page, "Figures in thousand NOK"));
    }

    [Fact]
    public void Render_empty_table_is_its_sentence()
    {
        var lines = PdfText.Lines(PdfRenderer.Render(SampleDocuments.Of(SampleDocuments.LongTable(0, 1))));
        Assert.Contains("No rows.", lines);
        Assert.DoesNotContain("Book", lines);
    }

    [Theory]
    [InlineData(400)]
    [InlineData(9_000)]
    public void Render_very_long_word_loses_no_letter(int length)
    {
        var word = string.Concat(Enumerable.Range(0, length).Select(i => (char)('a' + (i % 26))));
        var table = new Table([new("Word", 1), new("Figure", 1, Alignment.Right)], [new RowGroup([new Row([word, "1.0"])])], "");
        var file = PdfRenderer.Render(SampleDocuments.Of(new Paragraph(word), table));
        PdfText.AssertInsideMargins(file);
        var letters = string.Concat(PdfText.Lines(file));
        Assert.Equal(2 * length, CountOfRuns(letters, word));
    }

    [Fact]
    public void Render_huge_figures_are_neither_broken_nor_cut()
    {
        const string figure = "−123,456,789,012,345,678.9";
        Column Right(string name) => new(name, 1, Alignment.Right, "EUR");
        var table = new Table(
            [new("A name in words that may wrap as often as it must", 9), Right("a"), Right("b"), Right("c")],
            [new RowGroup([new Row(["Some words that wrap when figures need the room", figure, figure, figure])])], "");
        var file = PdfRenderer.Render(SampleDocuments.Of(table));
        PdfText.AssertInsideMargins(file);
        Assert.Equal(3, PdfText.Lines(file).Count(line => line == figure));
    }

    [Fact]
    public void Render_character_without_glyph_is_replaced_and_reported()
    {
        var lines = PdfText.Lines(PdfRenderer.Render(SampleDocuments.Of(new Paragraph("Price 価 of \U0001F4C8 today"), new Heading("価"))));
        Assert.Contains("Price ◊ of ◊ today", lines);
        Assert.Contains("Characters that the embedded typeface lacks were replaced by ◊: U+4FA1, U+1F4C8.", lines);
    }

    [Theory]
    [InlineData("Ærøskøbing, Łódź, Zürich, 5 € ± 3%, α ≤ β, ‘so’ – “thus”…")]
    [InlineData("a\u00A0b − ◊ ≥ · ×")]
    public void Render_characters_of_the_typeface_come_back_unchanged(string text) =>
        Assert.Contains(text, PdfText.Lines(PdfRenderer.Render(SampleDocuments.Of(new Paragraph(text)))));

    [Fact]
    public void Render_heading_at_the_foot_moves_with_its_text()
    {
        for (var space = 560; space <= 720; space += 8)
        {
            var pages = PdfText.Pages(PdfRenderer.Render(SampleDocuments.Of(
                new Paragraph("First."), new Spacer(space), new Heading("Kept"), new Paragraph("Its first line."))));
            Assert.Single(pages, page => page.Contains("Kept") && page.Contains("Its first line."));
        }
    }

    [Fact]
    public void Render_charts_are_vectors_and_each_face_is_embedded_once()
    {
        var file = PdfRenderer.Render(SampleDocuments.Everything());
        using var pdf = PdfDocument.Open(file);
        Assert.All(pdf.GetPages(), page => Assert.Empty(page.GetImages()));
        Assert.Contains(pdf.GetPages(), page => page.Paths.Count > 100);
        Assert.Equal(2, CountOf(file, "/FontFile2"));
        Assert.All(pdf.GetPages().SelectMany(page => page.Letters), letter => Assert.Contains("IBMPlexSans", letter.FontName, StringComparison.Ordinal));
    }

    [Fact]
    public void Render_properties_hold_title_and_no_date()
    {
        using var pdf = PdfDocument.Open(PdfRenderer.Render(SampleDocuments.Everything()));
        Assert.Equal("Sample report", pdf.Information.Title);
        Assert.Null(pdf.Information.CreationDate);
        Assert.Null(pdf.Information.ModifiedDate);
    }

    private static int CountOf(byte[] file, string text) =>
        System.Text.Encoding.Latin1.GetString(file).Split(text).Length - 1;

    // How many letters of the text lie in runs that the word holds: furniture between two pages may interrupt it.
    private static int CountOfRuns(string letters, string word)
    {
        var (count, i) = (0, 0);
        foreach (var letter in letters)
        {
            if (letter != word[i % word.Length])
                continue;
            i++;
            count++;
        }

        return count;
    }
}
