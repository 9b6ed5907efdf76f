using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.NoiseField.Fitting;

/// <summary>Matrices that fits of one array share, so that a decision allocates little. One user at a time.</summary>
/// <param name="channels">N.</param>
public sealed class FitWorkspace(int channels)
{
    /// <summary>Number of channels, N.</summary>
    public int Channels { get; } = channels;

    /// <summary>Data covariance with the known gains taken out, S′.</summary>
    public ComplexMatrix Data { get; } = new(channels, channels);

    /// <summary>The field's covariance, without the channels' own noise.</summary>
    public ComplexMatrix Field { get; } = new(channels, channels);

    /// <summary>W = R⁻¹ over the trusted channels, zero elsewhere.</summary>
    public ComplexMatrix Weight { get; } = new(channels, channels);

    /// <summary>W S′.</summary>
    public ComplexMatrix WeightData { get; } = new(channels, channels);

    /// <summary>W S′ W.</summary>
    public ComplexMatrix WeightDataWeight { get; } = new(channels, channels);

    /// <summary>ln det of R over the trusted channels, nepers.</summary>
    public double LogDeterminant { get; set; }

    internal ComplexMatrix Scratch { get; } = new(channels, channels);

    internal ComplexMatrix ScratchToo { get; } = new(channels, channels);
}
