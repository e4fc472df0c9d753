namespace RiskWorker.Reporting.Pdf;

/// <summary>A4 in points, with its margins.</summary>
internal static class PageGeometry
{
    public const float Width = 595;
    public const float Height = 842;
    public const float Side = 50;
    public const float Head = 32;
    public const float BodyTop = 62;
    public const float BodyBottom = 788;
    public const float Foot = 802;
    public const float BodyWidth = Width - (2 * Side);
    public const float BodyHeight = BodyBottom - BodyTop;
}
