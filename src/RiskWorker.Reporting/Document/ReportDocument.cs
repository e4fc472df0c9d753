namespace RiskWorker.Reporting.Document;

/// <summary>A report as plain data: what it says, in order, and nothing about where it lands on a page.</summary>
/// <param name="Title">Stands in the file's properties and at the left of every page's head.</param>
/// <param name="Running">Stands at the right of every page's head: the as-of date and the run.</param>
/// <param name="Foot">Stands at the left of every page's foot; the page number stands at the right.</param>
/// <param name="Sections">The sections, in reading order; one without blocks leaves no trace.</param>
public sealed record ReportDocument(string Title, string Running, string Foot, IReadOnlyList<Section> Sections);

/// <summary>A run of blocks that belong together.</summary>
/// <param name="Blocks">The blocks, in reading order.</param>
/// <param name="StartsPage">Whether the section begins on a new page.</param>
public sealed record Section(IReadOnlyList<Block> Blocks, bool StartsPage = false);
