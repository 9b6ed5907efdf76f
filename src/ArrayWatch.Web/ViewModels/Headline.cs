using System.Globalization;
using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Web.ViewModels;

/// <summary>The most important fact about an array, as one line.</summary>
/// <param name="Tone">How urgent it is.</param>
/// <param name="Text">The fact.</param>
/// <param name="Detail">What else to know; empty for nothing.</param>
public sealed record Headline(HeadlineTone Tone, string Text, string Detail)
{
    /// <summary>The headline of one array.</summary>
    /// <param name="overview">The array now.</param>
    /// <param name="alerts">Alerts of any array that stand or wait; only this array's are read.</param>
    /// <param name="now">Wall clock.</param>
    public static Headline Of(ArrayOverview overview, IReadOnlyList<AlertEvent> alerts, DateTimeOffset now)
    {
        ArgumentNullException.ThrowIfNull(overview);
        List<AlertEvent> standing = [.. alerts.Where(a => a.Array == overview.Id && AlertStateWords.Stands(a)
            && a.State is not (AlertState.Shelved or AlertState.SuppressedByDesign or AlertState.OutOfService))];
        string faults = string.Join("; ", standing.OrderByDescending(static a => a.Priority).Take(3).Select(AlertSentence.Of))
            + (standing.Count > 3 ? string.Create(CultureInfo.InvariantCulture, $"; and {standing.Count - 3} more") : "");
        return overview.Standing switch
        {
            "waiting" => new(HeadlineTone.NoData, "No data yet", "Nothing has arrived for this array since the service started."),
            "silent" => new(HeadlineTone.NoData, $"Data stopped {AgeText.Ago(overview.LastArrival, now)}",
                "Everything below is from before that. Check the publisher and the broker."),
            "starting" => new(HeadlineTone.NoData, "Starting: too few data to judge yet",
                $"Channels are judged once about {AgeText.Span(overview.TimeConstant)} of data have come."),
            "field-not-understood" => new(HeadlineTone.Attention, "Noise field not understood just now",
                "The model fits badly, so no new channel fault is named until it fits again." + (faults.Length > 0 ? " Known before: " + faults + "." : "")),
            _ => OfCounts(overview, standing, faults),
        };
    }

    private static Headline OfCounts(ArrayOverview overview, List<AlertEvent> standing, string faults)
    {
        int total = overview.Geometry.Count;
        int Count(Standing s) => overview.Counts.GetValueOrDefault(s);
        int faulty = Count(Standing.Faulty), suspect = Count(Standing.Suspect), unknown = Count(Standing.Unknown), out_ = Count(Standing.OutOfService);
        string rest = Rest(Count(Standing.Trusted), total, suspect: faulty > 0 ? suspect : 0, unknown, out_);
        if (faulty > 0)
            return new(HeadlineTone.Fault, Channels(faulty) + " faulty" + (faults.Length > 0 ? ": " + faults : ""), rest);
        if (standing.Count > 0) return new(HeadlineTone.Fault, faults, rest);
        if (suspect > 0) return new(HeadlineTone.Attention, Channels(suspect) + " suspect", rest);
        if (unknown == total) return new(HeadlineTone.NoData, "No channel can be judged", "The field shows too little of the channels just now.");
        if (unknown > 0 || out_ > 0)
        {
            return new(HeadlineTone.Good,
                string.Create(CultureInfo.InvariantCulture, $"{Count(Standing.Trusted)} of {total} channels trusted"),
                Rest(0, 0, 0, unknown, out_) + ". No fault stands.");
        }
        return new(HeadlineTone.Good, string.Create(CultureInfo.InvariantCulture, $"All {total} channels trusted"), "");
    }

    private static string Rest(int trusted, int total, int suspect, int unknown, int out_)
    {
        List<string> parts = [];
        if (total > 0) parts.Add(string.Create(CultureInfo.InvariantCulture, $"{trusted} of {total} trusted"));
        if (suspect > 0) parts.Add(string.Create(CultureInfo.InvariantCulture, $"{suspect} suspect"));
        if (unknown > 0) parts.Add(string.Create(CultureInfo.InvariantCulture, $"{unknown} cannot be judged"));
        if (out_ > 0) parts.Add(string.Create(CultureInfo.InvariantCulture, $"{out_} out of service"));
        return string.Join(", ", parts);
    }

    private static string Channels(int count) => count == 1 ? "1 channel" : string.Create(CultureInfo.InvariantCulture, $"{count} channels");
}

/// <summary>How urgent a headline is.</summary>
public enum HeadlineTone
{
    /// <summary>Nothing to do.</summary>
    Good,

    /// <summary>Look when you can.</summary>
    Attention,

    /// <summary>A fault stands.</summary>
    Fault,

    /// <summary>Nothing can be said.</summary>
    NoData,
}
