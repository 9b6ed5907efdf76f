using ArrayWatch.Monitoring.Reports;
using InfluxDB.Client.Api.Domain;
using InfluxDB.Client.Writes;

namespace ArrayWatch.Storage;

/// <summary>Turns rows into points: array_channel (tags array, channel), array_field (tag array), array_alert (tags array, kind, alert).</summary>
internal static class InfluxPoints
{
    public static IEnumerable<PointData> Of(OutboxRow row, IReadOnlyList<string> labels) =>
        row.Kind == Outbox.AlertKind ? [Of(Outbox.Read<AlertEvent>(row.Body))] : Of(row, Outbox.Read<MetricSet>(row.Body), labels);

    private static IEnumerable<PointData> Of(OutboxRow row, MetricSet metrics, IReadOnlyList<string> labels)
    {
        int channels = metrics.Channels.Values.Select(v => v.Length).DefaultIfEmpty(0).Max();
        for (int i = 0; i < Math.Min(channels, labels.Count); i++)
        {
            PointData point = PointData.Measurement("array_channel").Tag("array", row.Array).Tag("channel", labels[i]).Timestamp(row.Time.UtcDateTime, WritePrecision.Ms);
            foreach ((string name, float[] values) in metrics.Channels)
            {
                // The line protocol has no NaN: a value that the data cannot tell is left out.
                if (i < values.Length && float.IsFinite(values[i])) point = point.Field(name, (double)values[i]);
            }

            if (point.HasFields()) yield return point;
        }

        PointData field = PointData.Measurement("array_field").Tag("array", row.Array).Timestamp(row.Time.UtcDateTime, WritePrecision.Ms);
        foreach ((string name, double value) in metrics.Field)
        {
            if (double.IsFinite(value)) field = field.Field(name, value);
        }

        if (field.HasFields()) yield return field;
    }

    private static PointData Of(AlertEvent alert) => PointData.Measurement("array_alert")
        .Tag("array", alert.Array).Tag("kind", alert.Kind).Tag("alert", alert.Id)
        .Field("state", alert.State.ToString()).Field("channels", string.Join(' ', alert.Channels)).Field("confidence", alert.Confidence)
        .Field("standing", alert.Returned is null)
        .Timestamp(alert.Changed.UtcDateTime, WritePrecision.Ms);
}
