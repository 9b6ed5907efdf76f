using ArrayWatch.Detection.Hypotheses;

namespace ArrayWatch.Detection.Evidence;

/// <summary>
/// Lets evidence add up over event time, and says which explanations stand.
/// </summary>
/// <remarks>
/// One decision's evidence of L nats against an error at tolerance has a probability below e^−L to arise by
/// chance. Over a month an array makes D decisions on H hypotheses; asking for ln(D·H/budget) nats keeps the expected
/// number of chance alerts under the budget, whatever the dependence between decisions (union bound). That much is
/// asked of every decision over a whole dwell, which is longer than the memory's turnover, so that the mixture of before and
/// after that the memory holds just after a change is not named: weaker evidence fills the dwell in proportion.
/// </remarks>
internal sealed class EvidenceLedger
{
    private readonly Dictionary<string, Entry> _entries = [];
    private readonly double _askedNats;
    private readonly double _dwellSeconds;

    /// <summary>Starts empty.</summary>
    /// <param name="askedNats">Evidence asked of each decision, nats.</param>
    /// <param name="dwellSeconds">Time that full evidence must last to raise, and its absence to return, seconds.</param>
    public EvidenceLedger(double askedNats, double dwellSeconds)
    {
        _askedNats = askedNats;
        _dwellSeconds = dwellSeconds;
    }

    /// <summary>Explanations that stand.</summary>
    public IEnumerable<Entry> Standing => _entries.Values.Where(e => e.Stands);

    /// <summary>True when an explanation that stands concerns the channel.</summary>
    public bool Concerns(int channel) => Standing.Any(e => e.Latest.Indices.Contains(channel));

    /// <summary>Takes one decision's explanations.</summary>
    /// <param name="candidates">What the decision proposes.</param>
    /// <param name="seconds">Event time since the last decision.</param>
    /// <param name="onset">Onset of an explanation, seconds since 1970.</param>
    /// <param name="mayRaise">False while nothing new may be raised.</param>
    public void Take(IReadOnlyList<Candidate> candidates, double seconds, Func<Candidate, double> onset, bool mayRaise)
    {
        double step = seconds / _dwellSeconds;
        Dictionary<string, Candidate> seen = candidates.GroupBy(c => c.Key).ToDictionary(g => g.Key, g => g.MaxBy(c => c.Nats)!);
        foreach (Candidate c in seen.Values)
        {
            if (c.Nats <= 0 && !_entries.ContainsKey(c.Key)) continue;
            if (!_entries.TryGetValue(c.Key, out Entry? entry)) _entries[c.Key] = entry = new Entry(c, onset(c));
            entry.Take(c, step * Math.Clamp(c.Nats / _askedNats, 0, 1), mayRaise);
        }

        foreach ((string key, Entry entry) in _entries.ToArray())
        {
            if (!seen.ContainsKey(key)) entry.Miss(step);
            if (entry.Fill <= 0 && !seen.ContainsKey(key)) _entries.Remove(key);
        }
    }

    /// <summary>One explanation over time.</summary>
    internal sealed class Entry(Candidate first, double onset)
    {
        // A fault keeps its size; an estimate that wanders by more than this, in tolerances or as a share, is a field that is misunderstood.
        private const double WandersBy = 0.6;
        private const double WandersShare = 0.25;

        private double _size = first.Size;

        /// <summary>The last decision's view; what it is about stays as it was when raised.</summary>
        public Candidate Latest { get; private set; } = first;

        public double OnsetSeconds { get; } = onset;

        /// <summary>0 to 1: how much of the dwell is filled.</summary>
        public double Fill { get; private set; }

        public bool Stands { get; private set; }

        public double Nats { get; private set; }

        public void Take(Candidate candidate, double fill, bool mayRaise)
        {
            if (!Stands && Math.Abs(candidate.Size - _size) > WandersBy + (WandersShare * Math.Abs(_size))) Fill = 0;
            _size = double.IsNaN(_size) ? candidate.Size : _size + (0.5 * (candidate.Size - _size));
            Latest = Stands ? candidate with { Indices = Latest.Indices } : candidate;
            Fill = Math.Min(1, Fill + fill);
            Nats = Math.Max(Nats, candidate.Nats);
            if (Fill >= 1 - 1e-9 && mayRaise) Stands = true;
        }

        public void Miss(double fill)
        {
            Fill = Math.Max(0, Fill - fill);
            if (Fill <= 0) Stands = false;
        }
    }
}
