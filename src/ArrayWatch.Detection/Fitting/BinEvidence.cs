namespace ArrayWatch.Detection.Fitting;

/// <summary>
/// What one bin says of every channel: each channel's data against what the trusted others predict at its place.
/// Arrays have one entry a channel; powers are in the publisher's unit². Rewritten at each decision.
/// </summary>
/// <param name="channels">N.</param>
internal sealed class BinEvidence(int channels)
{
    /// <summary>Bin centre, hertz.</summary>
    public double Frequency { get; set; }

    /// <summary>False when the bin had no fit, or holds interference, and tells nothing of the channels.</summary>
    public bool Usable { get; set; }

    /// <summary>ln|g|, nepers, of the response against the model, the array's common gain taken out.</summary>
    public double[] LogGain { get; } = new double[channels];

    /// <summary>arg g, radians, what is smooth along the array taken out.</summary>
    public double[] Phase { get; } = new double[channels];

    /// <summary>Standard error of <see cref="LogGain"/>, and of <see cref="Phase"/> in radians, from the data alone.</summary>
    public double[] StandardError { get; } = new double[channels];

    /// <summary>Magnitude-squared coherence of the channel with its prediction.</summary>
    public double[] Coherence { get; } = new double[channels];

    /// <summary>What that coherence would be were the channel healthy.</summary>
    public double[] ExpectedCoherence { get; } = new double[channels];

    /// <summary>Power of the channel.</summary>
    public double[] Level { get; } = new double[channels];

    /// <summary>Power that the field and the array's usual self-noise explain.</summary>
    public double[] ExpectedLevel { get; } = new double[channels];

    /// <summary>Power of the channel that its prediction leaves, over what it leaves of a healthy one of the same gain.</summary>
    public double[] ResidualRatio { get; } = new double[channels];

    /// <summary>Spread of the trusted channels' phases beyond their standard errors, radians: how far the model misleads.</summary>
    public double PhaseFloor { get; set; }

    /// <summary>Spread of the trusted channels' log-gains beyond their standard errors, nepers.</summary>
    public double LogGainFloor { get; set; }

    /// <summary>Effective snapshots, ν, that each channel was judged by.</summary>
    public double[] Snapshots { get; } = new double[channels];

    /// <summary>Common log-gain that was taken out, nepers.</summary>
    public double CommonLogGain { get; set; }

    /// <summary>Phases that were taken out, radians.</summary>
    public double[] PhaseTrend { get; } = new double[channels];

    /// <summary>Largest eigenvalue of R⁻¹S over the trusted channels; about (1+√(N/ν))² when the model holds.</summary>
    public double LargestEigenvalue { get; set; }

    /// <summary>Share of the off-diagonal power of the trusted channels that the model misses, 0 to 1.</summary>
    public double Misfit { get; set; }

    /// <summary>Channels outside the trusted set whose data were tried at each other's places.</summary>
    public PlaceTable? Places { get; set; }

    /// <summary>The coherent component that no wave explains; null for none.</summary>
    public ForeignPattern? Foreign { get; set; }
}
