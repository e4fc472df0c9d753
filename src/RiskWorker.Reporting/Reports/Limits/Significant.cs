using System.Globalization;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>Parameters as text: a column of them holds numbers of every size, so digits are counted from the first that is not zero.</summary>
internal static class Significant
{
    private const int Digits = 4;

    /// <summary>Four significant digits; whole numbers as they are, tiny ones with their power of ten.</summary>
    public static string Text(double? value)
    {
        if (value is not { } number || !double.IsFinite(number))
            return Numerals.Missing;

        // What rounds up to the next power of ten has a digit less behind the point.
        var size = Math.Abs(number) * (1 + 5e-5);
        if (size is 0 or >= 1e3 || (Math.Abs(number) >= 1 && number == Math.Floor(number)))
            return Numerals.Fixed(number);
        if (size < 1e-4)
            return number.ToString("0.###e-0", CultureInfo.InvariantCulture).Replace("-", Numerals.Minus, StringComparison.Ordinal);

        var decimals = Digits - 1;
        for (var edge = 1.0; size < edge; edge /= 10)
            decimals++;
        for (var edge = 10.0; size >= edge; edge *= 10)
            decimals--;
        return Numerals.Fixed(number, decimals);
    }
}
