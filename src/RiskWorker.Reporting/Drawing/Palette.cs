using RiskWorker.Reporting.Document;
using SkiaSharp;

namespace RiskWorker.Reporting.Drawing;

/// <summary>
/// Every colour of every document. Ink on white has a contrast above 12 to 1, grey text above 5 to 1; the four status
/// colours differ in lightness too, so that they stay apart in grey print beside their shapes.
/// </summary>
internal static class Palette
{
    public static readonly SKColor Ink = SKColor.Parse("#1C2733");
    public static readonly SKColor Grey = SKColor.Parse("#5A6672");
    public static readonly SKColor Rule = SKColor.Parse("#D3D9DE");
    public static readonly SKColor Track = SKColor.Parse("#E8ECEF");
    public static readonly SKColor Accent = SKColor.Parse("#0E4D64");
    public static readonly SKColor Body = SKColor.Parse("#8FB0BD");
    public static readonly SKColor Tint = SKColor.Parse("#E3EDF0");
    public static readonly SKColor Paper = SKColors.White;

    public static readonly SKColor Good = SKColor.Parse("#4F8A6B");
    public static readonly SKColor Warning = SKColor.Parse("#C48A1A");
    public static readonly SKColor Undecided = SKColor.Parse("#6A5A9E");
    public static readonly SKColor Bad = SKColor.Parse("#9C2A2A");

    public static SKColor Of(StatusMark mark) => mark switch
    {
        StatusMark.Good => Good,
        StatusMark.Warning => Warning,
        StatusMark.Undecided => Undecided,
        StatusMark.Bad => Bad,
        _ => Accent,
    };
}
