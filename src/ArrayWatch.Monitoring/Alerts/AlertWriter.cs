using System.Globalization;
using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>Puts an alert into the words of its message. Pure.</summary>
internal sealed class AlertWriter(ArrayDefinition array, double chatterSeconds)
{
    /// <summary>The alert as it is at an event time.</summary>
    public AlertEvent Write(AlertEntry entry, double timeSeconds)
    {
        Finding f = entry.Finding;
        string[] labels = [.. f.Indices.Select(i => array.Geometry.Channels[i].Label)];
        return new AlertEvent
        {
            Id = entry.Id,
            Array = array.Id,
            Kind = f.Kind,
            State = entry.State,
            Priority = entry.Priority,
            Channels = labels,
            Indices = [.. f.Indices],
            Group = f.Group,
            Onset = EventTime.FromSeconds(f.OnsetSeconds),
            Raised = entry.Raised,
            Returned = entry.Returned,
            Changed = EventTime.FromSeconds(timeSeconds),
            Estimate = f.Estimate,
            Confidence = f.Confidence,
            Cause = f.Cause,
            Effect = entry.Effect,
            Advice = AlertPolicy.Advice(f, labels),
            Alternatives = f.Alternatives.Count > 0 ? f.Alternatives : null,
            Reason = entry.Held ? Held(f.Reason) : f.Reason,
            Evidence = f.Evidence.Count > 0 ? f.Evidence : null,
            AcknowledgedBy = entry.AcknowledgedBy,
            Until = entry.Until,
        };
    }

    private string Held(string? reason)
    {
        string held = string.Create(
            CultureInfo.InvariantCulture,
            $"it comes and goes ({ChatterWatch.Occurrences} times within {chatterSeconds:0} s) and is held until it has been gone for as long");
        return string.IsNullOrEmpty(reason) ? held : $"{reason}; {held}";
    }
}
