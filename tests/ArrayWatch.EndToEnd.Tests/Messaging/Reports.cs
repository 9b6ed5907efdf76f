using System.Globalization;
using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.EndToEnd.Tests.Messaging;

/// <summary>Reports as a pipeline makes them.</summary>
internal static class Reports
{
    private static readonly DateTimeOffset _time = new(2026, 5, 1, 4, 12, 30, TimeSpan.Zero);

    public static AlertOutput Alert(int id) => new("aft", _time, new AlertEvent
    {
        Id = id.ToString(CultureInfo.InvariantCulture),
        Array = "aft",
        Kind = "dead",
        State = AlertState.ReturnedUnacknowledged,
        Priority = AlertPriority.High,
        Channels = ["H01"],
        Indices = [0],
        Onset = _time,
        Raised = _time,
        Changed = _time,
        Estimate = new Dictionary<string, object> { ["levelDecibels"] = -61.5 },
        Confidence = 0.999,
        Advice = "Leave H01 out.",
    });

    public static HealthOutput Health(long frames) => new("aft", _time, new HealthReport
    {
        Time = _time,
        Array = "aft",
        Frames = frames,
        Snapshots = frames,
        LastSequence = 1,
        Refused = new Dictionary<string, long>(),
        Field = new FieldReport(0.1, 1500, true, new Dictionary<string, double>()),
        Alerts = [],
        Channels = [new ChannelReport { Index = 0, Label = "H01", Standing = Standing.Faulty }],
        Ready = true,
        DegreesOfFreedom = 240,
    });

    public static CorrectionsOutput Corrections() => new("aft", _time, new CorrectionReport
    {
        Time = _time,
        Array = "aft",
        Frequencies = [100],
        Channels = [new ChannelCorrectionReport(0, "H01", false, 0, [[1, 0]], [double.NaN])],
        Beams = [],
    });

    public static MetricsOutput Metrics() => new("aft", _time, new MetricSet(new Dictionary<string, float[]>(), new Dictionary<string, double>()));
}
