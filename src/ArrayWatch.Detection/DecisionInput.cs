using ArrayWatch.Signals.Covariance;

namespace ArrayWatch.Detection;

/// <summary>What one decision judges. The estimates are read, never changed, and only during the call.</summary>
public sealed record DecisionInput
{
    /// <summary>Event time of the newest snapshot, seconds since 1970.</summary>
    public required double TimeSeconds { get; init; }

    /// <summary>Bin centres, hertz, ascending; F of them.</summary>
    public required IReadOnlyList<double> Frequencies { get; init; }

    /// <summary>Sound speed, m/s.</summary>
    public required double SoundSpeed { get; init; }

    /// <summary>Estimate over the last quarter of the fast memory: shows what is new without what was before.</summary>
    public required ExponentialCovariance Recent { get; init; }

    /// <summary>Estimate over the fast memory.</summary>
    public required ExponentialCovariance Fast { get; init; }

    /// <summary>Channels that a person took out of use: neither trusted nor judged.</summary>
    public IReadOnlySet<int> OutOfService { get; init; } = new HashSet<int>();
}
