using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>How soon somebody should act on each kind of fault, and what to do: the one table of it. Immutable.</summary>
/// <remarks>
/// A fault that spoils a beam without being seen in its level (exchanged, reversed or mistimed channels, a false
/// coherent arrival) is high from the start. Another is raised by one step when the worst look direction has lost
/// <see cref="ConventionalLossDecibels"/> (conventional) or <see cref="AdaptiveLossDecibels"/> (adaptive) of array gain.
/// </remarks>
internal static class AlertPolicy
{
    internal const double ConventionalLossDecibels = 1;
    internal const double AdaptiveLossDecibels = 3;

    private static readonly Dictionary<string, (AlertPriority Priority, string Advice)> Kinds = new(StringComparer.Ordinal)
    {
        ["dead"] = (AlertPriority.Medium, "Leave {0} out of every beam; check the sensor, its cable and its preamplifier."),
        ["gain"] = (AlertPriority.Low, "Multiply {0} by the published correction; check the gain setting and the preamplifier."),
        ["rolloff"] = (AlertPriority.Low, "Multiply {0} by the published correction of each bin; check for a leak, a loose coupling or a filter setting."),
        ["excess-noise"] = (AlertPriority.Low, "Give {0} less weight or leave it out; look for flow noise, a loose mount or a bad contact."),
        ["polarity"] = (AlertPriority.High, "Reverse the sign of {0}; check its wiring."),
        ["phase"] = (AlertPriority.Medium, "Multiply {0} by the published correction; check its filter and its converter."),
        ["delay"] = (AlertPriority.Medium, "Multiply {0} by the published correction; check the sampling time and the position of the sensor."),
        ["clock-drift"] = (AlertPriority.High, "Do not form beams across {0} and the rest until the clock is locked again; check the module's timing."),
        ["swap"] = (AlertPriority.High, "Use {0} by the published mapping; check the order of the wiring."),
        ["crosstalk"] = (AlertPriority.Medium, "Leave the channel that receives the leak out of adaptive beams; check insulation and connectors of {0}."),
        ["coherent-interference"] = (AlertPriority.High, "Leave the frequencies named out of adaptive beams; look for electrical pick-up on {0}: ground, shield, supply."),
        ["intermittent"] = (AlertPriority.Medium, "Leave {0} out until it is repaired; look for a loose contact."),
        ["saturation"] = (AlertPriority.Medium, "Lower the gain of {0}, or leave it out while it clips."),
        ["stuck"] = (AlertPriority.Medium, "Leave {0} out; restart its converter."),
        ["offset"] = (AlertPriority.Low, "Take the constant part of {0} off; check its converter."),
        ["geometry"] = (AlertPriority.High, "Correct the positions of the channels in the configuration, or let the line straighten, before trusting any beam."),
    };

    private static readonly Dictionary<string, (AlertPriority Priority, string Advice)> Stream = new(StringComparer.Ordinal)
    {
        [StreamCauses.Missing] = (AlertPriority.Medium, "Check the network, the broker's queue limits and the load of the publisher."),
        [StreamCauses.Late] = (AlertPriority.Low, "Check the publisher's clock and its acquisition for blocks left out."),
        [StreamCauses.Repeated] = (AlertPriority.Low, "Check that one publisher alone sends this stream, and that its sequence counts by one."),
        [StreamCauses.Refused] = (AlertPriority.Medium, "Compare what the publisher sends with the configuration; the log names the reason."),
        [StreamCauses.NotFinite] = (AlertPriority.Medium, "Check the front end of {0}; while it sends such values, take it out of service so that the others' snapshots count."),
        [StreamCauses.Silence] = (AlertPriority.High, "Check that the publisher runs and reaches the broker, and that its topic has the array's id."),
    };

    /// <summary>How soon somebody should act.</summary>
    public static AlertPriority Priority(Finding finding, IReadOnlyDictionary<string, double>? effect)
    {
        AlertPriority own = Row(finding).Priority;
        if (finding.Kind == AlertCondition.StreamKind || own == AlertPriority.High || effect is null) return own;
        bool spoilt = effect.GetValueOrDefault("conventional") >= ConventionalLossDecibels
            || effect.GetValueOrDefault("adaptive") >= AdaptiveLossDecibels;
        return spoilt ? own + 1 : own;
    }

    /// <summary>What to do now, in a sentence.</summary>
    public static string Advice(Finding finding, IReadOnlyList<string> labels) =>
        string.Format(System.Globalization.CultureInfo.InvariantCulture, Row(finding).Advice, Name(finding, labels));

    /// <summary>Whether a group's alert explains another alert on some of its channels.</summary>
    public static bool Covers(Finding group, Finding member)
    {
        if (group.Group is null || group.Indices.Count < 2 || member.Kind == AlertCondition.StreamKind) return false;
        if (member.Group == group.Group && member.Kind == group.Kind) return false;
        if (member.Indices.Count == 0 || member.Indices.Count >= group.Indices.Count || !member.Indices.All(group.Indices.Contains)) return false;
        return group.Kind == member.Kind || group.Kind switch
        {
            "dead" => true,
            "clock-drift" => member.Kind is "delay" or "phase",
            "excess-noise" => member.Kind is "gain",
            _ => false,
        };
    }

    private static (AlertPriority Priority, string Advice) Row(Finding finding) =>
        finding.Kind == AlertCondition.StreamKind
            ? Stream.GetValueOrDefault(finding.Cause ?? "", (AlertPriority.Medium, "Check the stream."))
            : Kinds.GetValueOrDefault(finding.Kind, (AlertPriority.Medium, "Check {0}."));

    private static string Name(Finding finding, IReadOnlyList<string> labels) =>
        finding.Group is { } group
            ? $"group {group}"
            : labels.Count switch
            {
                0 => "the array",
                1 => labels[0],
                <= 6 => $"{string.Join(", ", labels.Take(labels.Count - 1))} and {labels[^1]}",
                _ => $"{labels.Count} channels",
            };
}
