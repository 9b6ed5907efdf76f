using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Alerts;
using ArrayWatch.Monitoring.Estimation;
using ArrayWatch.Monitoring.Hosting;
using ArrayWatch.Monitoring.Mapping;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;
using ArrayWatch.Signals;
using ArrayWatch.Signals.Covariance;
using ArrayWatch.Signals.LinearAlgebra;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Monitoring;

/// <summary>
/// One array over time: lets frames in or refuses them, folds them into the memories, decides when a decision is due,
/// and tells what changed.
/// </summary>
/// <remarks>
/// Event time drives everything: the same frames give the same outputs whenever and however fast they come. The wall
/// clock serves for "nothing has arrived" and for the end of a shelf alone (<see cref="Tick"/>). Safe from any thread:
/// one lock holds the whole array, since a decision reads the memories that a frame would change.
/// </remarks>
internal sealed partial class ArrayPipeline : IArrayInbox
{
    private readonly Lock _gate = new();
    private readonly ArrayDefinition _array;
    private readonly Action<MonitorOutput> _tell;
    private readonly Action _changed;
    private readonly TimeProvider _time;
    private readonly MonitorMeter _meter;
    private readonly ILogger _log;
    private readonly StreamGuard _guard;
    private readonly StreamSupervisor _stream;
    private readonly SoundSpeedTracker _soundSpeed;
    private readonly DecisionClock _clock;
    private readonly OutputSchedule _schedule = new();
    private readonly AlertBook _book;
    private readonly DateTimeOffset _started;
    private readonly long[] _nonFinite;

    private ArrayDiagnosis _diagnosis;
    private ArrayEstimates? _estimates;
    private Diagnosis? _last;
    private IReadOnlyList<Finding> _streamFindings = [];
    private Finding? _silence;
    private IReadOnlySet<int> _outOfService = new HashSet<int>();
    private DateTimeOffset? _arrival;
    private long _frames;
    private long _snapshots;
    private long _transients;
    private volatile ArrayView _view;

    /// <summary>Starts without data.</summary>
    /// <param name="array">The array.</param>
    /// <param name="tell">Takes each output, in order; called under the array's lock, so it must not wait long.</param>
    /// <param name="changed">Called after each change that a page would show.</param>
    /// <param name="time">Wall clock.</param>
    /// <param name="meter">Counters.</param>
    /// <param name="log">Log.</param>
    /// <exception cref="ArgumentException">An unknown noise-field component, or a medium outside the equations' range.</exception>
    public ArrayPipeline(
        ArrayDefinition array, Action<MonitorOutput> tell, Action changed, TimeProvider time, MonitorMeter meter, ILogger log)
    {
        (_array, _tell, _changed, _time, _meter, _log) = (array, tell, changed, time, meter, log);
        _guard = new(array.Geometry.Count, array.TimeConstant, array.SlowTimeConstant);
        _stream = new(array.Geometry.Count);
        _soundSpeed = new(array.Medium);
        _clock = new(array.TimeConstant);
        _book = new(array);
        _nonFinite = new long[array.Geometry.Count];
        _diagnosis = NewDiagnosis();
        _started = time.GetUtcNow();
        _view = Look(null, null);
    }

    /// <inheritdoc/>
    public string Id => _array.Id;

    /// <inheritdoc/>
    public int ChannelCount => _array.Geometry.Count;

    /// <summary>What readers see.</summary>
    public ArrayView View => _view;

    /// <summary>Takes up the alerts that were open when the service last stopped.</summary>
    public void Restore(IReadOnlyList<AlertEvent> alerts)
    {
        lock (_gate)
        {
            _book.Restore(alerts);
            _outOfService = _book.OutOfServiceChannels;
            Publish();
        }
    }

    /// <inheritdoc/>
    public Refusal? Accept(in SnapshotFrame frame)
    {
        lock (_gate)
        {
            StreamVerdict verdict = _guard.Judge(frame);
            if (verdict.Refusal is { } refusal)
            {
                Count(refusal);
                return refusal;
            }

            _arrival = _time.GetUtcNow();
            if (verdict.Begins != StreamBegin.No) Begin(frame, verdict);
            Fold(frame, verdict);
            double now = _guard.LastTimeSeconds;
            if (_clock.IsDue(now)) Decide(_estimates!, now);
            else if (_silence is not null) EndSilence(now);
            else _view = _view with { Overview = _view.Overview with { LastFrame = EventTime.FromSeconds(now), LastArrival = _arrival } };
            return null;
        }
    }

    /// <inheritdoc/>
    public void Accept(EnvironmentReading reading)
    {
        ArgumentNullException.ThrowIfNull(reading);
        lock (_gate)
        {
            if (_soundSpeed.Take(reading) is { } reason) LogReadingLeftAside(Id, reason);
        }
    }

    /// <inheritdoc/>
    public void Refuse(Refusal refusal)
    {
        ArgumentNullException.ThrowIfNull(refusal);
        lock (_gate) Count(refusal);
    }

    /// <summary>Carries out a person's action on one of this array's alerts.</summary>
    /// <returns>The alert after it and the action's name in the audit log; null when no such alert is open here.</returns>
    /// <exception cref="InvalidOperationException">The action is not possible in the alert's state; the message says why.</exception>
    public (AlertEvent Alert, string Done)? Act(AlertAction action)
    {
        lock (_gate)
        {
            if (_book.Act(action, EventNow, _time.GetUtcNow()) is not { } done) return null;
            Tell([done.Alert]);
            _outOfService = _book.OutOfServiceChannels;
            Publish();
            return done;
        }
    }

    /// <summary>What the wall clock alone can tell: nothing has arrived, a shelf has ended.</summary>
    /// <returns>The alerts whose shelf or out-of-service has ended, and what was done.</returns>
    public IReadOnlyList<(AlertEvent Alert, string Done)> Tick()
    {
        lock (_gate)
        {
            DateTimeOffset now = _time.GetUtcNow();
            IReadOnlyList<(AlertEvent Alert, string Done)> ended = _book.Expire(EventNow, now);
            Tell(ended.Select(e => e.Alert));
            TimeSpan quiet = now - (_arrival ?? _started);
            bool falls = _silence is null && quiet > _array.SilenceLimit;
            if (falls)
            {
                LogSilence(Id, quiet.TotalSeconds);
                _silence = StreamSupervisor.Make(StreamCauses.Silence, [], EventNow, new() { ["silentSeconds"] = Math.Round(quiet.TotalSeconds) });
                UpdateAlerts(EventNow);
            }

            if (!falls && ended.Count == 0) return [];
            _outOfService = _book.OutOfServiceChannels;
            Publish();
            return ended;
        }
    }

    /// <summary>Coherence of the bin nearest to a frequency; null when there are no data.</summary>
    /// <param name="frequency">Hz.</param>
    /// <param name="scale">"fast" or "slow".</param>
    /// <exception cref="ArgumentException">Another scale.</exception>
    public CoherencePicture? Coherence(double frequency, string scale)
    {
        if (scale is not ("fast" or "slow")) throw new ArgumentException($"there is no scale '{scale}'; 'fast' and 'slow' are known", nameof(scale));
        Covariances copy;
        lock (_gate)
        {
            if (_estimates is not { } e || e.Fast.DegreesOfFreedom <= 0) return null;
            int nearest = Enumerable.Range(0, e.Frequencies.Count).MinBy(f => Math.Abs(e.Frequencies[f] - frequency));
            copy = Copy(e, nearest, scale);
        }

        return Picture(copy);
    }

    /// <summary>Event time; the wall clock's before the first frame, when there is no other.</summary>
    private double EventNow => _guard.LastSequence is null ? EventTime.ToSeconds(_time.GetUtcNow()) : _guard.LastTimeSeconds;

    private ArrayDiagnosis NewDiagnosis() => new(_array.Geometry, new DiagnosisOptions
    {
        Tolerances = _array.Tolerances,
        FalseAlertsPerMonth = _array.FalseAlertsPerMonth,
        FieldComponents = _array.FieldComponents,
        TimeConstantSeconds = _array.TimeConstant.TotalSeconds,
        LookDirections = _array.LookDirections,
    });

    private void Count(Refusal refusal)
    {
        _stream.Refuse(refusal.Reason);
        _meter.Refused(Id, refusal.Reason);
    }

    private void Begin(in SnapshotFrame frame, in StreamVerdict verdict)
    {
        LogStreamBegins(Id, verdict.Begins, frame.Sequence, frame.Bins);
        if (!verdict.Restart) return;
        _estimates = new ArrayEstimates(_array, _guard.Frequencies);
        Array.Clear(_nonFinite);
        _transients = 0;
        _clock.Begin(frame.TimeSeconds);
        if (verdict.Begins == StreamBegin.First) return;
        _diagnosis = NewDiagnosis();
        _last = null;
        _schedule.Begin();
        _book.Unsettle();
    }

    private void Fold(in SnapshotFrame frame, in StreamVerdict verdict)
    {
        ArrayEstimates e = _estimates!;
        _stream.Frame(verdict, _guard.LastTimeSeconds, frame.Snapshots);
        long before = e.Fast.Snapshots;
        e.Fold(frame, verdict.GapSeconds, _outOfService);
        long folded = e.Fast.Snapshots - before, transients = e.Transients - _transients;
        ReadOnlySpan<long> nonFinite = e.Fast.NonFiniteSnapshots;
        for (int n = 0; n < nonFinite.Length; n++)
        {
            if (nonFinite[n] == _nonFinite[n]) continue;
            _stream.CountNotFinite(n, nonFinite[n] - _nonFinite[n]);
            _nonFinite[n] = nonFinite[n];
        }

        _frames++;
        _snapshots += folded;
        _transients = e.Transients;
        _meter.Frame(Id, folded, transients, verdict.MissingFrames);
    }

    private void Decide(ArrayEstimates e, double now)
    {
        _silence = null;
        _streamFindings = _stream.Judge(now);
        long start = _time.GetTimestamp();
        try
        {
            _last = _diagnosis.Decide(new DecisionInput
            {
                TimeSeconds = now,
                Frequencies = e.Frequencies,
                SoundSpeed = _soundSpeed.MetresPerSecond,
                Recent = e.Recent,
                Fast = e.Fast,
                OutOfService = _outOfService,
            });
        }
#pragma warning disable CA1031 // No data may end the process: what one decision could not do, the next may.
        catch (Exception failure)
#pragma warning restore CA1031
        {
            _meter.Failure("decision");
            LogDecisionFailed(failure, Id, now);
        }

        UpdateAlerts(now);
        if (_last is { } diagnosis && diagnosis.TimeSeconds == now)
        {
            _meter.Decision(Id, diagnosis, _time.GetElapsedTime(start).TotalSeconds);
            Report(e, diagnosis);
        }
        else
        {
            Publish();
        }
    }

    private void EndSilence(double now)
    {
        _silence = null;
        UpdateAlerts(now);
        Publish();
    }

    private void UpdateAlerts(double now)
    {
        List<AlertCondition> conditions = [.. (_last?.Findings ?? []).Concat(_streamFindings).Select(AlertCondition.Of)];
        if (_silence is { } silence) conditions.Add(AlertCondition.Of(silence));
        ReturnEvidence evidence = new(_last, _array.TimeConstant.TotalSeconds);
        Tell(_book.Update(now, conditions, evidence, _last is { Ready: true } ? BeamCost.Of(_last.Beams) : null));
    }

    private void Tell(IEnumerable<AlertEvent> alerts)
    {
        foreach (AlertEvent a in alerts)
        {
            LogAlert(Id, a.Kind, a.Cause, a.State, a.Priority, string.Join(", ", a.Channels), a.Id);
            _tell(new AlertOutput(Id, a.Changed, a));
        }
    }

    private void Report(ArrayEstimates e, Diagnosis diagnosis)
    {
        DateTimeOffset time = EventTime.FromSeconds(diagnosis.TimeSeconds);
        IReadOnlyList<AlertEvent> open = _book.Open;
        StreamTally tally = new(_frames, _snapshots, _guard.LastSequence, [.. _stream.Refused], _stream.MissingFrames, e.Transients);
        HealthReport health = HealthMapper.Map(_array, diagnosis, tally, _outOfService, open);
        CorrectionReport corrections = CorrectionMapper.Map(_array, diagnosis, e.Frequencies, _outOfService);
        if (_schedule.MetricsDue(diagnosis.TimeSeconds))
            _tell(new MetricsOutput(Id, time, MetricMapper.Map(diagnosis, tally, health.Alerts.Count)));
        bool healthDue = _schedule.HealthDue(health, diagnosis.TimeSeconds, _clock.IntervalSeconds);
        if (healthDue) _tell(new HealthOutput(Id, time, health));
        if (_schedule.CorrectionsDue(corrections, healthDue)) _tell(new CorrectionsOutput(Id, time, corrections));
        if (_schedule.PictureDue(diagnosis, _clock.IntervalSeconds))
            _tell(new CoherenceOutput(Id, time, Picture(Copy(e, _schedule.NextBin(e.Frequencies.Count), "fast"))));
        _view = Look(health, corrections);
        _meter.Standing(Id, _view.Overview.Counts, health.Alerts.Count);
        _changed();
    }

    private void Publish()
    {
        _view = Look(_view.Health, _view.Corrections);
        _changed();
    }

    private ArrayView Look(HealthReport? health, CorrectionReport? corrections)
    {
        IReadOnlyList<AlertEvent> open = _book.Open;
        bool begun = _guard.LastSequence is not null;
        ArrayOverview overview = new()
        {
            Id = Id,
            Geometry = _array.Geometry,
            Frequencies = _guard.Frequencies,
            LastFrame = begun ? EventTime.FromSeconds(_guard.LastTimeSeconds) : null,
            LastArrival = _arrival,
            Standing = ArrayStanding.Word(begun, _silence is not null, _last, open),
            Counts = ArrayStanding.Count(ChannelCount, health),
            OpenAlerts = open.Count(HealthMapper.Stands),
            SoundSpeed = _soundSpeed.MetresPerSecond,
            TimeConstant = _array.TimeConstant,
            SlowTimeConstant = _array.SlowTimeConstant,
        };
        return new ArrayView(overview, health, corrections, open);
    }

    private Covariances Copy(ArrayEstimates e, int bin, string scale)
    {
        ExponentialCovariance source = scale == "slow" ? e.Slow : e.Fast;
        ComplexMatrix measured = new(ChannelCount, ChannelCount), model = new(ChannelCount, ChannelCount);
        source.CopyBin(bin, measured);
        bool modelled = _last is not null && _diagnosis.TryCopyModel(bin, model);
        return new Covariances(_guard.LastTimeSeconds, e.Frequencies[bin], scale, measured, modelled ? model : null);
    }

    private CoherencePicture Picture(Covariances c) =>
        CoherenceMapper.Map(_array.Geometry, c.TimeSeconds, c.Frequency, c.Scale, c.Measured, c.Model);

    private sealed record Covariances(double TimeSeconds, double Frequency, string Scale, ComplexMatrix Measured, ComplexMatrix? Model);
}
