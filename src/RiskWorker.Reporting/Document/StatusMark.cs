namespace RiskWorker.Reporting.Document;

/// <summary>A state that is shown by a word and a drawn shape; colour only adds to them.</summary>
public enum StatusMark
{
    /// <summary>No state: a remark.</summary>
    None,

    /// <summary>All is well: an open circle.</summary>
    Good,

    /// <summary>Near the line: a filled triangle.</summary>
    Warning,

    /// <summary>The simulation cannot tell: a diamond, half of it filled.</summary>
    Undecided,

    /// <summary>Over the line, or failed: a filled square with a cross.</summary>
    Bad,
}
