using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Streams;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>Whether what is known now can say that a fault which is not seen is gone. Immutable.</summary>
/// <remarks>
/// In the start-up period nothing is said. An alert known from the store alone, or whose channels were out of service,
/// needs evidence of its own: its channels trusted over a fast memory, or not named over five, which is as long as the
/// evidence for a fault within reach takes to add up; a stream that has been in order for a whole window.
/// </remarks>
/// <param name="Diagnosis">The last decision; null before the first.</param>
/// <param name="MemorySeconds">Fast memory.</param>
internal sealed record ReturnEvidence(Diagnosis? Diagnosis, double MemorySeconds)
{
    private const double UntrustedMemories = 5;

    /// <summary>Whether evidence on this kind of fault comes in at all.</summary>
    public bool Speaks(Finding fault) => fault.Kind == AlertCondition.StreamKind || Diagnosis is { Ready: true };

    /// <summary>Whether a fault that is not seen is gone.</summary>
    /// <param name="fault">The fault.</param>
    /// <param name="unsettledSeconds">How long evidence has come in on an alert known from before; null for one that this run has seen.</param>
    public bool SaysGone(Finding fault, double? unsettledSeconds)
    {
        if (!Speaks(fault)) return false;
        if (unsettledSeconds is not { } seconds) return true;
        if (fault.Kind == AlertCondition.StreamKind) return fault.Cause == StreamCauses.Silence || seconds >= StreamWindow.Seconds;
        bool trusted = fault.Indices.Count > 0 && fault.Indices.All(i => Diagnosis?.Channels[i].Standing == Standing.Trusted);
        return seconds >= (trusted ? MemorySeconds : UntrustedMemories * MemorySeconds);
    }
}
