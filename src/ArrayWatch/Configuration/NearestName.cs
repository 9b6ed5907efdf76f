namespace ArrayWatch.Configuration;

/// <summary>Finds what somebody may have meant to write.</summary>
internal static class NearestName
{
    /// <summary>The candidate with the fewest edits (Levenshtein, 1966), upper and lower case alike; null when there are none.</summary>
    public static string? Of(string given, IEnumerable<string> candidates) =>
        candidates.MinBy(c => Distance(given.ToUpperInvariant(), c.ToUpperInvariant()));

    private static int Distance(string a, string b)
    {
        int[] row = [.. Enumerable.Range(0, b.Length + 1)];
        for (int i = 1; i <= a.Length; i++)
        {
            int diagonal = row[0];
            row[0] = i;
            for (int j = 1; j <= b.Length; j++)
            {
                int change = diagonal + (a[i - 1] == b[j - 1] ? 0 : 1);
                diagonal = row[j];
                row[j] = Math.Min(change, 1 + Math.Min(row[j], row[j - 1]));
            }
        }

        return row[b.Length];
    }
}
