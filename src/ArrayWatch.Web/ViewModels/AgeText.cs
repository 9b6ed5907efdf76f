using System.Globalization;

namespace ArrayWatch.Web.ViewModels;

/// <summary>Times and ages as people read them. Everything is UTC.</summary>
internal static class AgeText
{
    /// <summary>How long ago, or how long until, in the two largest sensible units: "12 s", "4 min 10 s", "3 h 20 min", "5 days".</summary>
    public static string Span(TimeSpan span)
    {
        TimeSpan s = span.Duration();
        return s.TotalSeconds < 60 ? Text($"{(int)s.TotalSeconds} s")
            : s.TotalMinutes < 10 ? Text($"{(int)s.TotalMinutes} min {s.Seconds} s")
            : s.TotalMinutes < 60 ? Text($"{(int)s.TotalMinutes} min")
            : s.TotalHours < 24 ? Text($"{(int)s.TotalHours} h {s.Minutes} min")
            : s.TotalDays < 2 ? Text($"1 day {s.Hours} h")
            : Text($"{(int)s.TotalDays} days");
    }

    /// <summary>"12 s ago", "in 3 min", or "never".</summary>
    public static string Ago(DateTimeOffset? time, DateTimeOffset now)
    {
        if (time is not { } t) return "never";
        TimeSpan age = now - t;
        return age < TimeSpan.FromSeconds(-1) ? $"in {Span(age)}" : $"{Span(age < TimeSpan.Zero ? TimeSpan.Zero : age)} ago";
    }

    /// <summary>"04:12:30 UTC", with the date before it when it is not today.</summary>
    public static string Utc(DateTimeOffset time, DateTimeOffset now)
    {
        DateTime t = time.UtcDateTime;
        return t.Date == now.UtcDateTime.Date
            ? t.ToString("HH:mm:ss 'UTC'", CultureInfo.InvariantCulture)
            : t.ToString("d MMM yyyy HH:mm:ss 'UTC'", CultureInfo.InvariantCulture);
    }

    /// <summary>Date and time in full.</summary>
    public static string Full(DateTimeOffset time) => time.UtcDateTime.ToString("d MMM yyyy HH:mm:ss 'UTC'", CultureInfo.InvariantCulture);

    /// <summary>For a machine: the datetime attribute.</summary>
    public static string Machine(DateTimeOffset time) => time.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss'Z'", CultureInfo.InvariantCulture);

    private static string Text(FormattableString text) => FormattableString.Invariant(text);
}
