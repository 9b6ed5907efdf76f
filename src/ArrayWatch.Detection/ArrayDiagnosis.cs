using ArrayWatch.Detection.Beams;
using ArrayWatch.Detection.Corrections;
using ArrayWatch.Detection.Evidence;
using ArrayWatch.Detection.Fitting;
using ArrayWatch.Detection.Hypotheses;
using ArrayWatch.NoiseField;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Detection;

/// <summary>
/// Judges one array, decision after decision: fits the expected noise field, explains what does not
/// fit by faults, and lets evidence add up until a fault is confirmed. Driven by event time only;
/// the same inputs give the same findings. One caller at a time.
/// </summary>
public sealed class ArrayDiagnosis
{
    private const double SecondsPerMonth = 30 * 86400;

    // Below this many effective snapshots the estimate says too little of anything.
    private const double LeastSnapshots = 16;

    // Time that full evidence must last, in fast memories: three of the recent one, after which a change has turned over in it.
    private const double DwellMemories = 0.75;

    // Time after which a change leaves less than a twentieth of what was before in the fast memory.
    private const double SettlingMemories = 3;

    private const double BeamsEverySeconds = 60;

    private readonly ArrayGeometry _geometry;
    private readonly DiagnosisOptions _options;
    private readonly FieldTracker _tracker;
    private readonly EvidenceLedger _ledger;
    private readonly BeamEvaluator _beams;
    private readonly double[] _deviatesSince;
    private double _first = double.NaN;
    private double _last = double.NaN;
    private double _beamsAt = double.NegativeInfinity;
    private string _beamsFor = "";
    private IReadOnlyList<BeamAssessment> _beamResult = [];

    /// <summary>Starts with no knowledge of the array but its geometry.</summary>
    /// <param name="geometry">Where the channels are.</param>
    /// <param name="options">What the user says of the array.</param>
    /// <exception cref="ArgumentException">An unknown noise-field component; the message lists the known ones.</exception>
    public ArrayDiagnosis(ArrayGeometry geometry, DiagnosisOptions options)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        ArgumentNullException.ThrowIfNull(options);
        _geometry = geometry;
        _options = options;
        _tracker = new FieldTracker(geometry, FieldComponents.Find(options.FieldComponents), options.Tolerances);
        double hypotheses = geometry.Count * (FaultHypotheses.All.Count + (geometry.Count / 2.0));
        double decisions = 6 * SecondsPerMonth / options.TimeConstantSeconds;
        _ledger = new EvidenceLedger(Math.Log(hypotheses * decisions / options.FalseAlertsPerMonth), DwellMemories * options.TimeConstantSeconds);
        _beams = new BeamEvaluator(geometry, options.LookDirections);
        _deviatesSince = new double[geometry.Count];
        Array.Fill(_deviatesSince, double.NaN);
    }

    /// <summary>Judges the array as the estimates have it now. Call at a regular interval of event time.</summary>
    /// <param name="input">The estimates.</param>
    /// <returns>What stands.</returns>
    public Diagnosis Decide(DecisionInput input)
    {
        ArgumentNullException.ThrowIfNull(input);
        double snapshots = input.Fast.DegreesOfFreedom;
        if (double.IsNaN(_first)) _first = input.TimeSeconds;
        double elapsed = double.IsNaN(_last) ? 0 : Math.Max(0, input.TimeSeconds - _last);
        _last = input.TimeSeconds;
        bool ready = input.TimeSeconds - _first >= 0.9 * _options.TimeConstantSeconds && snapshots >= LeastSnapshots;
        if (snapshots < LeastSnapshots || !_tracker.TryUpdate(input.Fast, input.Recent, input.Frequencies, input.SoundSpeed, input.OutOfService))
            return Nothing(input);
        BinEvidence[] bins = [.. _tracker.Bins.Select(b => b.Evidence)];
        bool understood = IsUnderstood(bins, snapshots);
        NoteDeviations(input.TimeSeconds, elapsed);
        DecisionScene scene = new()
        {
            Geometry = _geometry,
            Tolerances = _options.Tolerances,
            Bins = bins,
            Summaries = _tracker.Summaries,
            Trusted = _tracker.Trusted,
            OutOfService = input.OutOfService,
            IsSettling = _deviatesSince.Count(t => input.TimeSeconds - t < SettlingMemories * _options.TimeConstantSeconds) > 1,
        };
        foreach (IFaultHypothesis hypothesis in FaultHypotheses.All) hypothesis.Propose(scene);
        _ledger.Take(Plausible(GroupRule.Apply(scene.Candidates, _geometry)), elapsed, c => Onset(c, input.TimeSeconds), ready && understood);
        Finding[] findings = [.. _ledger.Standing.Select(ToFinding)];
        ChannelCorrection[] corrections = CorrectionBuilder.Corrections(findings, _tracker.Summaries, bins, input.OutOfService);
        return new Diagnosis
        {
            TimeSeconds = input.TimeSeconds,
            DegreesOfFreedom = snapshots,
            Ready = ready,
            Field = new FieldAssessment(bins.Where(b => b.Usable).Select(b => b.Misfit).DefaultIfEmpty(1).Average(), input.SoundSpeed, understood, Shares()),
            Channels = [.. _tracker.Summaries.Select(s => Assess(s, findings, input.OutOfService))],
            Findings = findings,
            Corrections = corrections,
            Beams = Beams(input, findings, bins, corrections),
        };
    }

    /// <summary>Writes the fitted model's covariance of one bin, healthy channels assumed.</summary>
    /// <param name="bin">0 to F−1.</param>
    /// <param name="destination">N×N.</param>
    /// <returns>False before the first fit; the destination is then left alone.</returns>
    public bool TryCopyModel(int bin, ComplexMatrix destination)
    {
        ArgumentNullException.ThrowIfNull(destination);
        ArgumentOutOfRangeException.ThrowIfNegative(bin);
        if (bin >= _tracker.Bins.Count || _tracker.Bins[bin].Powers is not { } powers) return false;
        if (!HasModel(_tracker.Bins[bin])) return false;
        double usual = ApertureTrend.Median([.. powers.ChannelNoise]);
        powers.WriteField(destination);
        for (int i = 0; i < _geometry.Count; i++) destination.Re[(i * _geometry.Count) + i] += usual;
        return true;
    }

    private Diagnosis Nothing(DecisionInput input) => new()
    {
        TimeSeconds = input.TimeSeconds,
        DegreesOfFreedom = input.Fast.DegreesOfFreedom,
        Ready = false,
        Field = new FieldAssessment(null, input.SoundSpeed, true, new Dictionary<string, double>()),
        Channels = [.. Enumerable.Range(0, _geometry.Count).Select(i =>
            new ChannelAssessment(i, input.OutOfService.Contains(i) ? Standing.OutOfService : Standing.Unknown, null, null, null, null, null))],
        Findings = [.. _ledger.Standing.Select(ToFinding)],
        Corrections = [],
        Beams = [],
    };

    // The field is understood while most bins have no large eigenvalue beside the model.
    private bool IsUnderstood(BinEvidence[] bins, double snapshots)
    {
        int trusted = _tracker.Trusted.Count(t => t);
        double edge = bins.Length == 0 ? 0 : ApertureTrend.Median([.. bins.Select(b => Math.Pow(1 + Math.Sqrt(trusted / snapshots), 2))]);
        double median = ApertureTrend.Median([.. bins.Where(b => b.LargestEigenvalue > 0).Select(b => b.LargestEigenvalue)]);
        return trusted > _geometry.Count / 2 && median < 4 * edge;
    }

    // Many channels that drift apart by phases and delays of their own at one time are a wave front that the model does not hold
    // (a near source, a bent array), not so many faults.
    private IReadOnlyList<Candidate> Plausible(IReadOnlyList<Candidate> candidates)
    {
        int bent = candidates.Count(c => c.Kind is "phase" or "delay" && c.Group is null);
        if (bent <= Math.Max(2, _geometry.Count / 8)) return candidates;
        return [.. candidates.Where(c => c.Group is not null || c.Kind is not ("phase" or "delay") || _ledger.Concerns(c.Indices[0]))];
    }

    private void NoteDeviations(double time, double elapsed)
    {
        foreach (ChannelSummary s in _tracker.Summaries)
        {
            if (_tracker.Trusted[s.Index]) _deviatesSince[s.Index] = double.NaN;
            else if (double.IsNaN(_deviatesSince[s.Index])) _deviatesSince[s.Index] = time - elapsed;
        }
    }

    private double Onset(Candidate candidate, double time)
    {
        double[] since = [.. candidate.Indices.Select(i => _deviatesSince[i]).Where(double.IsFinite)];
        return since.Length > 0 ? since.Max() : time;
    }

    private static Finding ToFinding(EvidenceLedger.Entry entry) => new()
    {
        Kind = entry.Latest.Kind,
        Indices = entry.Latest.Indices,
        Group = entry.Latest.Group,
        OnsetSeconds = entry.OnsetSeconds,
        Confidence = 1 - Math.Exp(-Math.Min(entry.Nats, 30)),
        Estimate = entry.Latest.Estimate,
        Alternatives = entry.Latest.Alternatives,
        Reason = entry.Latest.Reason,
        Cause = entry.Latest.Cause,
        Evidence = entry.Latest.Evidence,
    };

    private static ChannelAssessment Assess(ChannelSummary s, Finding[] findings, IReadOnlySet<int> outOfService)
    {
        Standing standing = outOfService.Contains(s.Index) ? Standing.OutOfService
            : findings.Any(f => f.Indices.Contains(s.Index)) ? Standing.Faulty
            : s.Deviation >= 1 ? Standing.Suspect
            : s.IsVisible ? Standing.Trusted : Standing.Unknown;
        double degrees = 180 / Math.PI;
        PhaseFit p = s.Phase;
        (double phase, double delay) = p.Law switch
        {
            PhaseLaw.Delay => (0, p.DelaySeconds),
            PhaseLaw.Both => (p.BothConstant, p.BothDelay),
            PhaseLaw.Constant or PhaseLaw.Reversed => (p.ConstantRadians, 0),
            _ => (p.ConstantRadians, p.DelaySeconds),
        };
        return new ChannelAssessment(
            s.Index,
            standing,
            s.Level > 0 ? new Measured(s.LevelDecibels, 4.34 / Math.Sqrt(Math.Max(1, s.Snapshots * s.Bins))) : null,
            s.IsVisible ? new Measured(s.GainDecibels, s.GainErrorDecibels) : null,
            s.IsVisible ? new Measured(phase * degrees, p.ConstantError * degrees) : null,
            s.IsVisible ? new Measured(1e6 * delay, 1e6 * p.DelayError) : null,
            s.Bins > 0 ? new Measured(s.ExcessDecibels, s.ExcessError) : null);
    }

    private Dictionary<string, double> Shares()
    {
        Dictionary<string, double> sums = [];
        double whole = 0;
        foreach (var powers in _tracker.Bins.Select(b => b.Powers).OfType<NoiseField.Fitting.FieldPowers>())
        {
            double noise = powers.ChannelNoise.Average(), all = powers.FieldPower + noise;
            if (!(all > 0)) continue;
            whole++;
            Add("plane-waves", powers.Waves.Sum() / all);
            Add("channel-noise", noise / all);
            for (int d = 0; d < powers.Dense.Length; d++) Add(powers.Basis.Dense[d].Name, powers.Dense[d] / all);
        }

        return sums.ToDictionary(p => p.Key, p => p.Value / whole);

        void Add(string name, double share) => sums[name] = sums.GetValueOrDefault(name) + share;
    }

    private static bool HasModel(BinTracker bin) => bin.Powers is { } powers && powers.FieldPower + ApertureTrend.Median([.. powers.ChannelNoise]) > 0;

    private IReadOnlyList<BeamAssessment> Beams(DecisionInput input, Finding[] findings, BinEvidence[] bins, ChannelCorrection[] corrections)
    {
        string key = string.Join(';', findings.Select(f => f.Kind + string.Join(',', f.Indices))) + string.Join(',', input.OutOfService.Order());
        if (_options.LookDirections.Count == 0 || _tracker.Bins.Any(b => !HasModel(b))) return [];
        if (key == _beamsFor && input.TimeSeconds - _beamsAt < BeamsEverySeconds) return _beamResult;
        (_beamsFor, _beamsAt) = (key, input.TimeSeconds);
        _beamResult = _beams.Assess(
            input.Frequencies, input.SoundSpeed, (f, m) => TryCopyModel(f, m),
            CorrectionBuilder.Delivered(findings, _tracker.Summaries, bins), corrections);
        return _beamResult;
    }
}
