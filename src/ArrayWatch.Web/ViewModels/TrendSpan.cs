namespace ArrayWatch.Web.ViewModels;

/// <summary>A length of time that trends are shown over.</summary>
/// <param name="Key">Its name in addresses.</param>
/// <param name="Name">What people call it.</param>
/// <param name="Length">How long it is.</param>
internal sealed record TrendSpan(string Key, string Name, TimeSpan Length)
{
    public static IReadOnlyList<TrendSpan> All { get; } =
    [
        new("hour", "last hour", TimeSpan.FromHours(1)),
        new("6-hours", "last 6 hours", TimeSpan.FromHours(6)),
        new("day", "last day", TimeSpan.FromDays(1)),
        new("week", "last week", TimeSpan.FromDays(7)),
        new("month", "last 30 days", TimeSpan.FromDays(30)),
        new("year", "last year", TimeSpan.FromDays(366)),
    ];

    public static TrendSpan Find(string? key) => All.FirstOrDefault(s => s.Key == key) ?? All[0];
}
