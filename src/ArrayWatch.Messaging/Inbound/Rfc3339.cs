namespace ArrayWatch.Messaging.Inbound;

/// <summary>Reads the date-time of RFC 3339, section 5.6, from UTF-8 text.</summary>
internal static class Rfc3339
{
    /// <summary>The longest text looked at: nanoseconds and an offset take 35 characters.</summary>
    private const int Longest = 64;

    /// <summary>
    /// Seconds since 1970, UTC. Any number of fraction digits; 'T', 't' or a space between date and time; the
    /// offset is required ('Z', 'z' or ±hh:mm); a leap second, 60, is the first second of the next minute.
    /// </summary>
    public static bool TryParse(ReadOnlySpan<byte> text, out double seconds)
    {
        seconds = 0;
        // yyyy-MM-ddThh:mm:ss and at least Z.
        if (text.Length is < 20 or > Longest) return false;
        if (!Digits(text, 0, 4, out int year) || text[4] != '-' || !Digits(text, 5, 2, out int month) || text[7] != '-'
            || !Digits(text, 8, 2, out int day) || text[10] is not ((byte)'T' or (byte)'t' or (byte)' ')
            || !Digits(text, 11, 2, out int hour) || text[13] != ':' || !Digits(text, 14, 2, out int minute) || text[16] != ':'
            || !Digits(text, 17, 2, out int second))
            return false;
        if (year < 1 || month is < 1 or > 12 || day < 1 || day > DateTime.DaysInMonth(year, month)
            || hour > 23 || minute > 59 || second > 60)
            return false;
        int position = 19;
        double fraction = 0;
        if (text[position] == '.')
        {
            double weight = 0.1;
            int first = ++position;
            for (; position < text.Length && text[position] is >= (byte)'0' and <= (byte)'9'; position++, weight /= 10)
                fraction += weight * (text[position] - '0');
            if (position == first) return false;
        }
        if (!Offset(text[position..], out int offsetMinutes)) return false;
        long days = new DateTime(year, month, day, 0, 0, 0, DateTimeKind.Utc).Ticks / TimeSpan.TicksPerDay
            - DateTime.UnixEpoch.Ticks / TimeSpan.TicksPerDay;
        seconds = days * 86400.0 + (hour * 60 + minute - offsetMinutes) * 60.0 + second + fraction;
        return true;
    }

    private static bool Offset(ReadOnlySpan<byte> text, out int minutes)
    {
        minutes = 0;
        if (text.Length == 1) return text[0] is (byte)'Z' or (byte)'z';
        if (text.Length != 6 || text[0] is not ((byte)'+' or (byte)'-') || text[3] != ':'
            || !Digits(text, 1, 2, out int h) || !Digits(text, 4, 2, out int m) || h > 23 || m > 59)
            return false;
        minutes = (text[0] == '-' ? -1 : 1) * (h * 60 + m);
        return true;
    }

    private static bool Digits(ReadOnlySpan<byte> text, int start, int count, out int value)
    {
        value = 0;
        foreach (byte b in text.Slice(start, count))
        {
            if (b is < (byte)'0' or > (byte)'9') return false;
            value = value * 10 + (b - '0');
        }
        return true;
    }
}
