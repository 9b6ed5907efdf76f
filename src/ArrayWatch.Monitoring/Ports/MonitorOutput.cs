using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Monitoring.Ports;

/// <summary>One thing that an array's pipeline tells the world.</summary>
/// <param name="Array">Id of the array.</param>
/// <param name="Time">Event time.</param>
public abstract record MonitorOutput(string Array, DateTimeOffset Time);

/// <summary>An alert has changed.</summary>
public sealed record AlertOutput(string Array, DateTimeOffset Time, AlertEvent Alert) : MonitorOutput(Array, Time);

/// <summary>The array's standing, at least once a minute while data come.</summary>
public sealed record HealthOutput(string Array, DateTimeOffset Time, HealthReport Health) : MonitorOutput(Array, Time);

/// <summary>What a beamformer should apply now; sent when it changes and with each health report.</summary>
public sealed record CorrectionsOutput(string Array, DateTimeOffset Time, CorrectionReport Corrections) : MonitorOutput(Array, Time);

/// <summary>Values of every metric at one time, for trends. Once a decision, at most every ten seconds of event time.</summary>
public sealed record MetricsOutput(string Array, DateTimeOffset Time, MetricSet Metrics) : MonitorOutput(Array, Time);

/// <summary>A coherence picture to keep, at least every ten minutes of event time.</summary>
public sealed record CoherenceOutput(string Array, DateTimeOffset Time, CoherencePicture Picture) : MonitorOutput(Array, Time);
