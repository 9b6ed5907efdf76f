using ArrayWatch.Detection.Fitting;
using ArrayWatch.Signals;

namespace ArrayWatch.Detection.Hypotheses;

/// <summary>What one decision sees, and what has been proposed to explain it. One writer.</summary>
internal sealed class DecisionScene
{
    private readonly List<Candidate> _candidates = [];
    private readonly HashSet<int> _claimed = [];

    public required ArrayGeometry Geometry { get; init; }

    public required Tolerances Tolerances { get; init; }

    public required IReadOnlyList<BinEvidence> Bins { get; init; }

    public required IReadOnlyList<ChannelSummary> Summaries { get; init; }

    public required bool[] Trusted { get; init; }

    public required IReadOnlySet<int> OutOfService { get; init; }

    /// <summary>True while channels that lately began to deviate are still part of what the fast memory holds.</summary>
    public required bool IsSettling { get; init; }

    public IReadOnlyList<Candidate> Candidates => _candidates;

    /// <summary>Channels that deviate, are judged at all, and are not explained yet.</summary>
    public IEnumerable<ChannelSummary> Unexplained =>
        Summaries.Where(s => !Trusted[s.Index] && !OutOfService.Contains(s.Index) && !_claimed.Contains(s.Index));

    /// <summary>True when a hypothesis has explained the channel.</summary>
    public bool IsClaimed(int channel) => _claimed.Contains(channel);

    /// <summary>Adds an explanation that settles its channels.</summary>
    public void Claim(Candidate candidate)
    {
        _candidates.Add(candidate);
        foreach (int i in candidate.Indices) _claimed.Add(i);
    }

    /// <summary>Adds an explanation that leaves room for others.</summary>
    public void Add(Candidate candidate) => _candidates.Add(candidate);

    /// <summary>Evidence that an estimate lies beyond a tolerance, nats: half the squared distance in standard errors, 0 within.</summary>
    public static double Beyond(double estimate, double tolerance, double standardError)
    {
        double z = (Math.Abs(estimate) - tolerance) / Math.Max(standardError, 1e-9);
        return z > 0 ? 0.5 * z * z : 0;
    }
}
