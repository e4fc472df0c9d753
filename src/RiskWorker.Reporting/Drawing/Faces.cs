using SkiaSharp;

namespace RiskWorker.Reporting.Drawing;

/// <summary>The embedded typeface in its two weights, read once; no font of the machine is ever used.</summary>
internal static class Faces
{
    public const string Family = "IBM Plex Sans";

    public static readonly SKTypeface Regular = Read("IBMPlexSans_400Regular.ttf");
    public static readonly SKTypeface Strong = Read("IBMPlexSans_600SemiBold.ttf");

    public static SKTypeface Of(bool strong) => strong ? Strong : Regular;

    private static SKTypeface Read(string file)
    {
        var name = "RiskWorker.Reporting.Fonts." + file;
        using var stream = typeof(Faces).Assembly.GetManifestResourceStream(name)
            ?? throw new InvalidOperationException($"The embedded font {name} is missing from the assembly.");
        using var data = SKData.Create(stream);
        return SKTypeface.FromData(data)
            ?? throw new InvalidOperationException($"The embedded font {name} is not a typeface.");
    }
}
