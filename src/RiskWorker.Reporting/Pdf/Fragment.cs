using SkiaSharp;

namespace RiskWorker.Reporting.Pdf;

/// <summary>A piece of a page that is never split: a line, a table row, a chart.</summary>
/// <param name="Height">Its height in points.</param>
/// <param name="Draw">Draws it with its top left corner at the point given.</param>
internal sealed record Fragment(float Height, Action<SKCanvas, SKPoint> Draw)
{
    /// <summary>White space above it, dropped at the top of a page.</summary>
    public float SpaceBefore { get; init; }

    /// <summary>Whether it stays on the page of the piece that follows.</summary>
    public bool KeepWithNext { get; init; }

    /// <summary>Drawn again above it when it begins a page: a table's head.</summary>
    public Fragment? Repeat { get; init; }

    /// <summary>Whether a new page begins at it.</summary>
    public bool StartsPage { get; init; }

    public float Extent => SpaceBefore + Height;

    /// <summary>A fragment that only begins a page.</summary>
    public static Fragment Break() => new(0, (_, _) => { }) { StartsPage = true };
}
