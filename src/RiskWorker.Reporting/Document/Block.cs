namespace RiskWorker.Reporting.Document;

/// <summary>One block of a document.</summary>
public abstract record Block;

/// <summary>A heading; it never stands alone at the foot of a page.</summary>
/// <param name="Text">The words.</param>
/// <param name="Level">1 (the document's), 2 (a section's) or 3.</param>
/// <param name="Lead">A line in smaller letters below the heading; null for none.</param>
public sealed record Heading(string Text, int Level = 2, RichText? Lead = null) : Block;

/// <summary>How loud a paragraph speaks.</summary>
public enum Voice
{
    /// <summary>Running text.</summary>
    Body,

    /// <summary>The one sentence a reader takes away.</summary>
    Lead,

    /// <summary>A remark below a table or figure.</summary>
    Note,
}

/// <summary>Running text that may break between its lines, never after the first or before the last.</summary>
/// <param name="Text">The words.</param>
/// <param name="Voice">Its size and weight.</param>
public sealed record Paragraph(RichText Text, Voice Voice = Voice.Body) : Block;

/// <summary>Sentences set apart by a rule and a status shape at their left.</summary>
/// <param name="Mark">The status that the rule shows.</param>
/// <param name="Head">The first line, in bold.</param>
/// <param name="Body">The lines below it, one paragraph each.</param>
public sealed record Callout(StatusMark Mark, string Head, IReadOnlyList<RichText> Body) : Block;

/// <summary>Two stacks of blocks side by side; on a page too short for both they follow each other.</summary>
/// <param name="Left">The left stack.</param>
/// <param name="Right">The right stack.</param>
/// <param name="LeftShare">The left stack's share of the width, in (0, 1).</param>
public sealed record Columns(IReadOnlyList<Block> Left, IReadOnlyList<Block> Right, double LeftShare = 0.5) : Block;

/// <summary>White space.</summary>
/// <param name="Points">Its height in points.</param>
public sealed record Spacer(float Points) : Block;

/// <summary>What follows begins on a new page.</summary>
public sealed record PageBreak : Block;
