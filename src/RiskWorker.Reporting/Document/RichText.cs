namespace RiskWorker.Reporting.Document;

/// <summary>A stretch of text of one weight.</summary>
/// <param name="Text">The characters; line ends and tabs count as spaces.</param>
/// <param name="Strong">Whether it is set in the heavier weight.</param>
public readonly record struct TextRun(string Text, bool Strong = false);

/// <summary>Text with emphasis: runs that follow each other without a space of their own.</summary>
public sealed class RichText
{
    private RichText(IReadOnlyList<TextRun> runs) => Runs = runs;

    /// <summary>No characters.</summary>
    public static RichText Empty { get; } = new([]);

    /// <summary>The runs, in reading order.</summary>
    public IReadOnlyList<TextRun> Runs { get; }

    /// <summary>Text of one weight.</summary>
    public static implicit operator RichText(string text) => Plain(text);

    /// <summary>Text of the ordinary weight.</summary>
    public static RichText Plain(string text) => new([new TextRun(text)]);

    /// <summary>Text of the heavier weight.</summary>
    public static RichText Strong(string text) => new([new TextRun(text, Strong: true)]);

    /// <summary>Runs of different weight.</summary>
    public static RichText Of(params IReadOnlyList<TextRun> runs) => new(runs);

    /// <inheritdoc/>
    public override string ToString() => string.Concat(Runs.Select(run => run.Text));
}
