using System.Text;

namespace ArrayWatch.Messaging;

/// <summary>Text from outside, made fit for a log line.</summary>
internal static class Text
{
    private const int Longest = 64;

    /// <summary>At most 64 characters, without control characters.</summary>
    public static string Shorten(ReadOnlySpan<char> text)
    {
        StringBuilder result = new(Longest + 1);
        foreach (char c in text[..Math.Min(text.Length, Longest)]) result.Append(char.IsControl(c) ? '?' : c);
        if (text.Length > Longest) result.Append('…');
        return result.ToString();
    }

    /// <summary>As <see cref="Shorten(ReadOnlySpan{char})"/>, of UTF-8 bytes; what is no UTF-8 is replaced.</summary>
    public static string Shorten(ReadOnlySpan<byte> utf8) =>
        Shorten(Encoding.UTF8.GetString(utf8[..Math.Min(utf8.Length, 4 * Longest)]).AsSpan());
}
