using System.Globalization;

namespace ArrayWatch.Web.ViewModels;

/// <summary>Numbers as the pages show them: a true minus sign, and no more digits than the standard error supports.</summary>
internal static class NumberText
{
    /// <summary>What stands where the data cannot tell.</summary>
    public const string CannotTell = "cannot tell";

    /// <summary>A signed value, such as a gain or a phase error: "+1.2", "−7.0".</summary>
    public static string Signed(double value, int decimals)
    {
        if (!double.IsFinite(value)) return CannotTell;
        string digits = Math.Abs(value).ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
        bool zero = digits.AsSpan().IndexOfAnyInRange('1', '9') < 0;
        return zero ? digits : value < 0 ? "−" + digits : "+" + digits;
    }

    /// <summary>A value without a forced plus sign.</summary>
    public static string Plain(double value, int decimals)
    {
        string text = Signed(value, decimals);
        return text.StartsWith('+') ? text[1..] : text;
    }

    /// <summary>A quantity with its standard error: "−7.0 ± 0.2". Decimals follow the error, between 0 and <paramref name="maximumDecimals"/>.</summary>
    public static string WithError(double? value, double? standardError, int maximumDecimals, bool signed = true)
    {
        if (value is not { } v || !double.IsFinite(v)) return CannotTell;
        if (standardError is not { } e || !double.IsFinite(e)) return signed ? Signed(v, maximumDecimals) : Plain(v, maximumDecimals);
        int decimals = e > 0 ? Math.Clamp(1 - (int)Math.Floor(Math.Log10(e)), 0, maximumDecimals) : maximumDecimals;
        return $"{(signed ? Signed(v, decimals) : Plain(v, decimals))} ± {e.ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture)}";
    }

    /// <summary>A number of unknown size: four significant digits.</summary>
    public static string General(double value) =>
        double.IsFinite(value) ? value.ToString("G4", CultureInfo.InvariantCulture).Replace('-', '−') : CannotTell;

    /// <summary>A probability near one keeps its nines: "99.97 %".</summary>
    public static string Confidence(double probability) =>
        !double.IsFinite(probability) ? CannotTell
        : probability >= 0.99995 ? "over 99.99 %"
        : (probability * 100).ToString(probability > 0.99 ? "F2" : "F0", CultureInfo.InvariantCulture) + " %";
}
