using System.Globalization;
using System.Text;
using ArrayWatch.Messaging.Inbound;

namespace ArrayWatch.Tests.Messaging;

public sealed class Rfc3339Tests
{
    // RFC 3339 (2002), section 5.8, examples 1, 2 and 5, with the instants in UTC that it states; 1970 by definition.
    [Theory]
    [InlineData("1985-04-12T23:20:50.52Z", "1985-04-12T23:20:50.5200000")]
    [InlineData("1996-12-19T16:39:57-08:00", "1996-12-20T00:39:57.0000000")]
    [InlineData("1937-01-01T12:00:27.87+00:20", "1937-01-01T11:40:27.8700000")]
    [InlineData("1970-01-01T00:00:00Z", "1970-01-01T00:00:00.0000000")]
    [InlineData("2024-02-29t12:00:00z", "2024-02-29T12:00:00.0000000")]
    [InlineData("2026-05-01 04:12:30Z", "2026-05-01T04:12:30.0000000")]
    public void Reads_the_examples_of_the_standard(string text, string utc)
    {
        DateTime expected = DateTime.Parse(utc, CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal | DateTimeStyles.AdjustToUniversal);
        Assert.True(Rfc3339.TryParse(Encoding.UTF8.GetBytes(text), out double seconds));
        Assert.Equal((expected - DateTime.UnixEpoch).TotalSeconds, seconds, 1e-6);
    }

    // RFC 3339 (2002), section 5.8: both name the leap second at the end of 1990.
    [Theory]
    [InlineData("1990-12-31T23:59:60Z")]
    [InlineData("1990-12-31T15:59:60-08:00")]
    public void A_leap_second_is_the_first_second_of_the_next_minute(string text)
    {
        Assert.True(Rfc3339.TryParse(Encoding.UTF8.GetBytes(text), out double seconds));
        Assert.Equal((new DateTime(1991, 1, 1, 0, 0, 0, DateTimeKind.Utc) - DateTime.UnixEpoch).TotalSeconds, seconds);
    }

    [Theory]
    [InlineData("")]
    [InlineData("2026-05-01")]
    [InlineData("2026-05-01T04:12:30")]
    [InlineData("2026-05-01T04:12:30.Z")]
    [InlineData("2026-05-01T04:12:30+2:00")]
    [InlineData("2026-05-01T04:12:30+25:00")]
    [InlineData("2026-02-30T04:12:30Z")]
    [InlineData("2026-13-01T04:12:30Z")]
    [InlineData("0000-01-01T04:12:30Z")]
    [InlineData("2026-05-01T24:00:00Z")]
    [InlineData("2026-05-01T04:12:61Z")]
    [InlineData("2026-05-01T04:12:30Zx")]
    [InlineData("20260501T041230Z....")]
    [InlineData("-026-05-01T04:12:30Z")]
    public void Refuses_anything_else(string text) => Assert.False(Rfc3339.TryParse(Encoding.UTF8.GetBytes(text), out _));
}
