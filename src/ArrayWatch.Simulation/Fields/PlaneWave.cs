using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Fields;

/// <summary>A steady source far away in a fixed direction.</summary>
public sealed record PlaneWave : WaveSource
{
    /// <summary>Unit vector that points at the source.</summary>
    public required Position Toward { get; init; }

    /// <inheritdoc/>
    public override void AddWave(SoundMoment moment, (double Re, double Im) amplitude, Span<double> re, Span<double> im)
    {
        double a = Math.Sqrt(Spectrum.PowerAt(moment.FrequencyHertz)) * AmplitudeAt(moment.SceneSeconds);
        AddPlane(moment, Toward, a * amplitude.Re, a * amplitude.Im, re, im);
    }
}
