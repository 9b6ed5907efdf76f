using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Monitoring.Mapping;

/// <summary>Says which outputs are due at a decision, by event time. One caller at a time.</summary>
internal sealed class OutputSchedule
{
    internal const double MetricsSeconds = 10;
    internal const double HealthSeconds = 60;
    internal const double PictureSeconds = 600;

    private const double Rounding = 1e-6;

    private double _metrics = double.NaN;
    private double _health = double.NaN;
    private double _picture = double.NaN;
    private int _pictures;
    private HealthReport? _lastHealth;
    private CorrectionReport? _lastCorrections;

    /// <summary>Event time starts again: everything is due at the next decision.</summary>
    public void Begin() => _metrics = _health = _picture = double.NaN;

    /// <summary>Metrics: at every decision, at most every ten seconds.</summary>
    public bool MetricsDue(double timeSeconds) => Due(ref _metrics, timeSeconds, MetricsSeconds);

    /// <summary>
    /// Health: so that a decision later would be more than a minute after the last, and at every change of standing, of
    /// readiness, of the field's being understood or of the standing alerts.
    /// </summary>
    /// <param name="health">What would be sent.</param>
    /// <param name="timeSeconds">Event time.</param>
    /// <param name="decisionSeconds">Time to the next decision.</param>
    public bool HealthDue(HealthReport health, double timeSeconds, double decisionSeconds)
    {
        bool changed = _lastHealth is not { } last || Differ(last, health);
        if (changed) _health = double.NaN;
        if (!Due(ref _health, timeSeconds, HealthSeconds - decisionSeconds + (2 * Rounding))) return false;
        _lastHealth = health;
        return true;
    }

    /// <summary>Corrections: with each health report, and when they have changed.</summary>
    public bool CorrectionsDue(CorrectionReport corrections, bool healthSent)
    {
        if (!healthSent && _lastCorrections is { } last && !CorrectionMapper.Differ(last, corrections)) return false;
        _lastCorrections = corrections;
        return true;
    }

    /// <summary>Coherence picture: so that a decision later would be more than ten minutes after the last; the first once the start-up period is over.</summary>
    public bool PictureDue(Diagnosis diagnosis, double decisionSeconds) =>
        (diagnosis.Ready || !double.IsNaN(_picture))
        && Due(ref _picture, diagnosis.TimeSeconds, PictureSeconds - decisionSeconds + (2 * Rounding));

    /// <summary>The next picture's bin: the middle one first, then on through all of them.</summary>
    public int NextBin(int bins) => ((bins / 2) + _pictures++) % bins;

    private static bool Differ(HealthReport a, HealthReport b) =>
        a.Ready != b.Ready
        || a.Field.Understood != b.Field.Understood
        || !a.Alerts.SequenceEqual(b.Alerts)
        || !a.Channels.Select(c => c.Standing).SequenceEqual(b.Channels.Select(c => c.Standing));

    private static bool Due(ref double last, double now, double every)
    {
        if (!double.IsNaN(last) && now - last < every - Rounding && now >= last) return false;
        last = now;
        return true;
    }
}
