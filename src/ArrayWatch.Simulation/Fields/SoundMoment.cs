using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Fields;

/// <summary>Where and when the sound is looked at: one bin of one snapshot.</summary>
public readonly ref struct SoundMoment
{
    /// <summary>Where the sensors truly are, metres.</summary>
    public required ReadOnlySpan<Position> Positions { get; init; }

    /// <summary>True sound speed, m/s.</summary>
    public required double SoundSpeed { get; init; }

    /// <summary>Seconds since the scene's start.</summary>
    public required double SceneSeconds { get; init; }

    /// <summary>Bin centre, hertz.</summary>
    public required double FrequencyHertz { get; init; }

    /// <summary>Wavenumber 2πf/c, radians per metre.</summary>
    public double Wavenumber => 2 * Math.PI * FrequencyHertz / SoundSpeed;
}
