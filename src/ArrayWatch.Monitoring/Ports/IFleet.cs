using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Signals;

namespace ArrayWatch.Monitoring.Ports;

/// <summary>The live arrays, for the pages and the HTTP interface. Safe from any thread.</summary>
public interface IFleet
{
    /// <summary>Each array's overview, in the configuration's order.</summary>
    IReadOnlyList<ArrayOverview> Arrays { get; }

    /// <summary>The last health report; null when the array is unknown or nothing has been decided yet.</summary>
    HealthReport? Health(string arrayId);

    /// <summary>The last corrections; null when there are none yet.</summary>
    CorrectionReport? Corrections(string arrayId);

    /// <summary>Coherence of the bin nearest to <paramref name="frequency"/>, as measured and as modelled; null when there are no data.</summary>
    /// <param name="arrayId">Id of the array.</param>
    /// <param name="frequency">Hz.</param>
    /// <param name="scale">"fast" or "slow".</param>
    CoherencePicture? Coherence(string arrayId, double frequency, string scale);

    /// <summary>Alerts that stand or wait for acknowledgement, newest first.</summary>
    IReadOnlyList<AlertEvent> OpenAlerts { get; }

    /// <summary>Counts up at every change that a page would show; compare to know whether to draw again.</summary>
    long Revision { get; }

    /// <summary>Carries out a person's action on an alert and writes it to the audit log.</summary>
    /// <returns>The alert after it; null when there is no such open alert.</returns>
    /// <exception cref="InvalidOperationException">The action is not possible in the alert's state; the message says why.</exception>
    Task<AlertEvent?> ActAsync(AlertAction action, CancellationToken cancellation);
}

/// <summary>A person's action on an alert.</summary>
/// <param name="Alert">Id of the alert.</param>
/// <param name="Verb">What to do.</param>
/// <param name="Who">Who does it; not empty.</param>
/// <param name="Why">Why; may be empty.</param>
/// <param name="Until">When shelving or out-of-service ends by itself; null for no end (shelving needs one, at most a week ahead).</param>
public sealed record AlertAction(string Alert, AlertVerb Verb, string Who, string Why, DateTimeOffset? Until);

/// <summary>What a person can do to an alert.</summary>
public enum AlertVerb
{
    /// <summary>Say that they know.</summary>
    Acknowledge,

    /// <summary>Put aside for a time.</summary>
    Shelve,

    /// <summary>Take back from the shelf.</summary>
    Unshelve,

    /// <summary>Take the channel out of use, for maintenance; a second time brings it back.</summary>
    OutOfService,
}

/// <summary>One array at a glance.</summary>
public sealed record ArrayOverview
{
    /// <summary>Id of the array.</summary>
    public required string Id { get; init; }

    /// <summary>Its channels and where they are.</summary>
    public required ArrayGeometry Geometry { get; init; }

    /// <summary>Bin centres, Hz; empty before the first frame.</summary>
    public required IReadOnlyList<double> Frequencies { get; init; }

    /// <summary>Event time of the last frame; null before the first.</summary>
    public required DateTimeOffset? LastFrame { get; init; }

    /// <summary>Wall-clock time at which the last frame arrived; null before the first.</summary>
    public required DateTimeOffset? LastArrival { get; init; }

    /// <summary>"waiting" (no data yet), "starting", "healthy", "degraded" (channels suspect or faulty), "field-not-understood" or "silent" (data stopped).</summary>
    public required string Standing { get; init; }

    /// <summary>Channels by standing.</summary>
    public required IReadOnlyDictionary<Detection.Standing, int> Counts { get; init; }

    /// <summary>Alerts that stand.</summary>
    public required int OpenAlerts { get; init; }

    /// <summary>Sound speed in use, m/s.</summary>
    public required double SoundSpeed { get; init; }

    /// <summary>Fast and slow memory.</summary>
    public required TimeSpan TimeConstant { get; init; }

    /// <summary>Slow memory.</summary>
    public required TimeSpan SlowTimeConstant { get; init; }
}
