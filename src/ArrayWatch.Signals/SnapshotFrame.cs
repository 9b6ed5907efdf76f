namespace ArrayWatch.Signals;

/// <summary>
/// A block of K narrowband snapshots at F bins of N channels: a view of a message, read in place.
/// Complex values follow the e^{+jωt} convention and lie row-major over snapshot, bin, channel,
/// each a real then an imaginary part.
/// </summary>
public readonly ref struct SnapshotFrame
{
    /// <summary>Seconds since 1970 (UTC) at the centre of the first snapshot's analysis window.</summary>
    public required double TimeSeconds { get; init; }

    /// <summary>Counts frames of the stream by one.</summary>
    public required ulong Sequence { get; init; }

    /// <summary>Seconds from one snapshot to the next, positive.</summary>
    public required double IntervalSeconds { get; init; }

    /// <summary>Share that consecutive analysis windows overlap, 0 ≤ o &lt; 1.</summary>
    public required double Overlap { get; init; }

    /// <summary>Bin centres, hertz, ascending; F of them.</summary>
    public required ReadOnlySpan<double> Frequencies { get; init; }

    /// <summary>Number of snapshots, K ≥ 1.</summary>
    public required int Snapshots { get; init; }

    /// <summary>Number of channels, N.</summary>
    public required int Channels { get; init; }

    /// <summary>2·K·F·N values; not necessarily aligned, and may hold non-finite values.</summary>
    public required ReadOnlySpan<float> Data { get; init; }

    /// <summary>Number of bins, F.</summary>
    public int Bins => Frequencies.Length;
}
