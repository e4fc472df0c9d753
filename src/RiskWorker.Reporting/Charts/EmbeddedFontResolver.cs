using RiskWorker.Reporting.Drawing;
using ScottPlot;
using SkiaSharp;

namespace RiskWorker.Reporting.Charts;

/// <summary>
/// Gives the charts the very typeface objects of the text, whatever name is asked for, so that each face is embedded once
/// and no font of the machine is looked for. The library's list of resolvers is global: it is changed once a process.
/// </summary>
internal sealed class EmbeddedFontResolver : IFontResolver
{
    private static readonly Lazy<bool> Added = new(() =>
    {
        Fonts.FontResolvers.Insert(0, new EmbeddedFontResolver());
        return true;
    });

    /// <summary>Adds the resolver at the first call.</summary>
    public static void Ensure() => _ = Added.Value;

    public SKTypeface? CreateTypeface(string fontName, FontWeight weight, FontSlant slant, FontSpacing spacing) =>
        Faces.Of(weight >= FontWeight.SemiBold);

    public SKTypeface? CreateTypeface(string fontName, bool bold, bool italic) => Faces.Of(bold);
}
