using SkiaSharp;

namespace RiskWorker.Reporting.Drawing;

/// <summary>How text is set: size and line height in points, weight, colour.</summary>
internal readonly record struct TextStyle(float Size, float Leading, SKColor Color, bool Strong = false)
{
    public static readonly TextStyle Title = new(21, 26, Palette.Ink, Strong: true);
    public static readonly TextStyle Section = new(13, 17, Palette.Accent, Strong: true);
    public static readonly TextStyle Subsection = new(9.5f, 13, Palette.Ink, Strong: true);
    public static readonly TextStyle Lead = new(12.5f, 17.5f, Palette.Ink);
    public static readonly TextStyle Body = new(9, 13, Palette.Ink);
    public static readonly TextStyle Note = new(7.5f, 10.5f, Palette.Grey);
    public static readonly TextStyle Cell = new(8, 10.5f, Palette.Ink);
    public static readonly TextStyle Head = new(7.25f, 9.5f, Palette.Grey, Strong: true);
    public static readonly TextStyle Unit = new(6.75f, 9, Palette.Grey);
    public static readonly TextStyle Figure = new(20, 24, Palette.Ink, Strong: true);
    public static readonly TextStyle Furniture = new(7.25f, 9.5f, Palette.Grey);

    /// <summary>From the top of a line to its baseline: the capitals stand in the middle of the line.</summary>
    public float Ascent => (Leading / 2) + (CapHeight * Size / 2);

    /// <summary>The height of the capitals.</summary>
    public float Capitals => CapHeight * Size;

    // IBM Plex Sans: capitals are 698 units of 1,000 high.
    private const float CapHeight = 0.698f;
}
