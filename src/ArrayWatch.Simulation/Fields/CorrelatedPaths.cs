using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Fields;

/// <summary>One source heard over two paths that are fully correlated: direct, and once reflected.</summary>
public sealed record CorrelatedPaths : WaveSource
{
    /// <summary>Unit vector of the direct arrival.</summary>
    public required Position Toward { get; init; }

    /// <summary>Unit vector of the reflected arrival.</summary>
    public required Position ReflectedToward { get; init; }

    /// <summary>Level of the reflection, dB re the direct arrival.</summary>
    public required double ReflectionDecibels { get; init; }

    /// <summary>How much later the reflection passes the frame's origin, seconds.</summary>
    public required double ReflectionDelaySeconds { get; init; }

    /// <summary>Phase that the reflection itself gives, radians: π at a pressure-release surface.</summary>
    public double ReflectionPhaseRadians { get; init; }

    /// <inheritdoc/>
    public override double MeanPower(double frequencyHertz) => Spectrum.PowerAt(frequencyHertz) * (1 + Decibels.ToPower(ReflectionDecibels));

    /// <inheritdoc/>
    public override void AddWave(SoundMoment moment, (double Re, double Im) amplitude, Span<double> re, Span<double> im)
    {
        double a = Math.Sqrt(Spectrum.PowerAt(moment.FrequencyHertz)) * AmplitudeAt(moment.SceneSeconds);
        AddPlane(moment, Toward, a * amplitude.Re, a * amplitude.Im, re, im);
        double b = a * Decibels.ToAmplitude(ReflectionDecibels);
        (double s, double c) = Math.SinCos(ReflectionPhaseRadians - (2 * Math.PI * moment.FrequencyHertz * ReflectionDelaySeconds));
        AddPlane(
            moment, ReflectedToward, b * ((amplitude.Re * c) - (amplitude.Im * s)), b * ((amplitude.Re * s) + (amplitude.Im * c)), re, im);
    }
}
