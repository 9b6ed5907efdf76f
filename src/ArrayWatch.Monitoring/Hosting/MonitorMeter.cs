using System.Diagnostics.Metrics;
using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Monitoring.Hosting;

/// <summary>What the service tells of its own work: the meter "ArrayWatch.Monitoring". Safe from any thread.</summary>
public sealed class MonitorMeter : IDisposable
{
    /// <summary>Name of the meter.</summary>
    public const string Name = "ArrayWatch.Monitoring";

    private readonly Meter _meter = new(Name);
    private readonly Counter<long> _frames;
    private readonly Counter<long> _snapshots;
    private readonly Counter<long> _missing;
    private readonly Counter<long> _transients;
    private readonly Counter<long> _refused;
    private readonly Counter<long> _leftOut;
    private readonly Counter<long> _failures;
    private readonly Histogram<double> _decision;
    private readonly Gauge<double> _degreesOfFreedom;
    private readonly Gauge<double> _misfit;
    private readonly Gauge<int> _standingAlerts;
    private readonly Gauge<int> _channels;

    /// <summary>Creates the instruments.</summary>
    public MonitorMeter()
    {
        _frames = _meter.CreateCounter<long>("arraywatch.frames", "{frame}", "Frames folded in.");
        _snapshots = _meter.CreateCounter<long>("arraywatch.snapshots", "{snapshot}", "Snapshots folded in.");
        _missing = _meter.CreateCounter<long>("arraywatch.frames.missing", "{frame}", "Frames that the sequence says are lost.");
        _transients = _meter.CreateCounter<long>("arraywatch.snapshots.transient", "{snapshot}", "Snapshots left out as transients.");
        _refused = _meter.CreateCounter<long>("arraywatch.messages.refused", "{message}", "Messages refused, by reason.");
        _leftOut = _meter.CreateCounter<long>("arraywatch.outputs.left_out", "{output}", "Outputs that a slow sink had no room for.");
        _failures = _meter.CreateCounter<long>("arraywatch.failures", "{failure}", "Decisions and writes to sinks that failed.");
        _decision = _meter.CreateHistogram<double>("arraywatch.decision.duration", "s", "Time that one decision takes.");
        _degreesOfFreedom = _meter.CreateGauge<double>("arraywatch.degrees_of_freedom", "1", "Effective degrees of freedom of the fast memory.");
        _misfit = _meter.CreateGauge<double>("arraywatch.field.misfit", "1", "Residual power that the noise field does not explain.");
        _standingAlerts = _meter.CreateGauge<int>("arraywatch.alerts.standing", "{alert}", "Alerts that stand.");
        _channels = _meter.CreateGauge<int>("arraywatch.channels", "{channel}", "Channels by standing.");
    }

    /// <inheritdoc/>
    public void Dispose() => _meter.Dispose();

    internal void Frame(string array, long snapshots, long transients, ulong missing)
    {
        KeyValuePair<string, object?> tag = Array(array);
        _frames.Add(1, tag);
        _snapshots.Add(snapshots, tag);
        if (transients > 0) _transients.Add(transients, tag);
        if (missing > 0) _missing.Add((long)Math.Min(missing, long.MaxValue), tag);
    }

    internal void Refused(string array, RefusalReason reason) => _refused.Add(1, Array(array), new("reason", RefusalReasons.Name(reason)));

    internal void Decision(string array, Diagnosis diagnosis, double seconds)
    {
        KeyValuePair<string, object?> tag = Array(array);
        _decision.Record(seconds, tag);
        _degreesOfFreedom.Record(diagnosis.DegreesOfFreedom, tag);
        if (diagnosis.Field.Misfit is { } misfit) _misfit.Record(misfit, tag);
    }

    internal void Standing(string array, IReadOnlyDictionary<Standing, int> counts, int standingAlerts)
    {
        KeyValuePair<string, object?> tag = Array(array);
        _standingAlerts.Record(standingAlerts, tag);
        foreach ((Standing standing, int count) in counts) _channels.Record(count, tag, new("standing", standing.ToString()));
    }

    internal void LeftOut(string sink) => _leftOut.Add(1, new KeyValuePair<string, object?>("sink", sink));

    internal void Failure(string what) => _failures.Add(1, new KeyValuePair<string, object?>("what", what));

    private static KeyValuePair<string, object?> Array(string array) => new("array", array);
}
