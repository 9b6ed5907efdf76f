using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Web.ViewModels;

/// <summary>Brings the live alerts and the stored ones into one list.</summary>
internal static class AlertList
{
    /// <summary>
    /// Live alerts replace their stored state, because a store may lag. Unacknowledged ones come first, then those that
    /// stand, then the rest; each by priority and then newest first when <paramref name="urgentFirst"/>, else newest first throughout.
    /// </summary>
    public static IReadOnlyList<AlertEvent> Merge(IEnumerable<AlertEvent> live, IEnumerable<AlertEvent> stored, bool urgentFirst)
    {
        Dictionary<string, AlertEvent> byId = new(StringComparer.Ordinal);
        foreach (AlertEvent a in stored) byId[a.Id] = a;
        foreach (AlertEvent a in live) byId[a.Id] = a;
        IOrderedEnumerable<AlertEvent> ordered = urgentFirst
            ? byId.Values.OrderBy(static a => AlertStateWords.NeedsAcknowledging(a.State) ? 0 : AlertStateWords.Stands(a) ? 1 : 2)
                .ThenByDescending(static a => a.Priority).ThenByDescending(static a => a.Raised)
            : byId.Values.OrderByDescending(static a => a.Raised);
        return [.. ordered.ThenByDescending(static a => a.Id, StringComparer.Ordinal)];
    }
}
