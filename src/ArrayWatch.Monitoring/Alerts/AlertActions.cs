using System.Globalization;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>What a person may do to an alert in each state, and what it does to it. Pure.</summary>
/// <remarks>
/// After IEC 62682: acknowledging is for what stands or has returned unseen; shelving has an end, at most a week
/// ahead, and shelving again moves the end; what comes from the shelf and still stands is announced anew, what
/// has gone is normal; an alert that the service holds back under its group's is acted on at the group's; out of
/// service is possible everywhere, and a second time brings back.
/// </remarks>
internal static class AlertActions
{
    internal static readonly TimeSpan LongestShelf = TimeSpan.FromDays(7);

    /// <summary>Carries out an action.</summary>
    /// <returns>Its name in the audit log.</returns>
    /// <exception cref="InvalidOperationException">It is not possible in this state; the message says why.</exception>
    public static string Apply(AlertEntry entry, AlertAction action, DateTimeOffset now)
    {
        if (string.IsNullOrWhiteSpace(action.Who)) throw new InvalidOperationException("say who does it");
        AlertState state = entry.State;
        return action.Verb switch
        {
            AlertVerb.Acknowledge => Acknowledge(entry, state, action.Who),
            AlertVerb.Shelve => Shelve(entry, state, action.Until, now),
            AlertVerb.Unshelve => Unshelve(entry, state),
            AlertVerb.OutOfService => OutOfService(entry, state, action.Until, now),
            _ => throw new InvalidOperationException($"there is no action {action.Verb}"),
        };
    }

    /// <summary>Takes an alert from the shelf: announced anew while it stands, normal otherwise.</summary>
    public static void TakeFromShelf(AlertEntry entry)
    {
        entry.Shelved = false;
        entry.Until = null;
        entry.Acknowledged = !entry.Active;
        entry.AcknowledgedBy = null;
    }

    /// <summary>
    /// Brings an alert's channels back into service. Nothing was judged meanwhile: what stood stands, announced anew,
    /// until new evidence says otherwise.
    /// </summary>
    public static void BringBack(AlertEntry entry)
    {
        entry.OutOfService = false;
        entry.Unsettle();
        entry.Until = null;
        entry.Acknowledged = !entry.Active;
        entry.AcknowledgedBy = null;
    }

    private static string Acknowledge(AlertEntry entry, AlertState state, string who)
    {
        switch (state)
        {
            case AlertState.Unacknowledged or AlertState.ReturnedUnacknowledged:
                entry.Acknowledged = true;
                entry.AcknowledgedBy = who;
                return "acknowledge";
            case AlertState.Acknowledged:
                throw Refused($"it has already been acknowledged by {entry.AcknowledgedBy ?? "somebody"}");
            default:
                throw Refused(Hindrance(state));
        }
    }

    private static string Shelve(AlertEntry entry, AlertState state, DateTimeOffset? until, DateTimeOffset now)
    {
        if (state is AlertState.SuppressedByDesign or AlertState.OutOfService or AlertState.Normal) throw Refused(Hindrance(state));
        if (until is not { } end) throw Refused("shelving needs an end");
        if (end <= now) throw Refused($"the shelf's end, {Text(end)}, has passed; now is {Text(now)}");
        if (end > now + LongestShelf) throw Refused($"the shelf's end, {Text(end)}, is more than {LongestShelf.Days} days ahead");
        entry.Shelved = true;
        entry.Until = end;
        return "shelve";
    }

    private static string Unshelve(AlertEntry entry, AlertState state)
    {
        if (state != AlertState.Shelved) throw Refused(state == AlertState.OutOfService ? Hindrance(state) : "it is not shelved");
        TakeFromShelf(entry);
        return "unshelve";
    }

    private static string OutOfService(AlertEntry entry, AlertState state, DateTimeOffset? until, DateTimeOffset now)
    {
        if (state == AlertState.OutOfService)
        {
            BringBack(entry);
            return "return-to-service";
        }

        if (state == AlertState.Normal) throw Refused(Hindrance(state));
        if (until <= now) throw Refused($"the end, {Text(until.GetValueOrDefault())}, has passed; now is {Text(now)}");
        entry.OutOfService = true;
        entry.Shelved = false;
        entry.Until = until;
        return "out-of-service";
    }

    private static string Hindrance(AlertState state) => state switch
    {
        AlertState.Shelved => "it is shelved; take it from the shelf first",
        AlertState.SuppressedByDesign => "it is held back under its group's alert; act on that one",
        AlertState.OutOfService => "it is out of service; bring it back first",
        _ => "it is back to normal",
    };

    private static string Text(DateTimeOffset time) => time.ToString("u", CultureInfo.InvariantCulture);

    private static InvalidOperationException Refused(string reason) => new($"not possible: {reason}");
}
