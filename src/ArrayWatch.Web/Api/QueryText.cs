using System.Globalization;

namespace ArrayWatch.Web.Api;

/// <summary>Reads values of a query, exactly and without regard to the host's culture.</summary>
internal static class QueryText
{
    /// <summary>RFC 3339, with an offset or Z; a time without one is refused because it could mean several.</summary>
    public static bool TryTime(string text, out DateTimeOffset time)
    {
        time = default;
        string trimmed = text.Trim();

        // A plus sign that was not escaped arrives as a space.
        if (trimmed.Length > 6 && trimmed[^6] == ' ') trimmed = string.Concat(trimmed.AsSpan(0, trimmed.Length - 6), "+", trimmed.AsSpan(trimmed.Length - 5));
        bool hasOffset = trimmed.EndsWith('Z') || trimmed.EndsWith('z') || (trimmed.Length > 6 && trimmed[^6] is '+' or '-' && trimmed[^3] == ':');
        return hasOffset && trimmed.Contains('T', StringComparison.OrdinalIgnoreCase)
            && DateTimeOffset.TryParse(trimmed, CultureInfo.InvariantCulture, DateTimeStyles.None, out time);
    }

    public static bool TryNumber(string text, out double value) =>
        double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out value) && double.IsFinite(value);
}
