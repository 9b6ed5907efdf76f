using ArrayWatch.Simulation.Levels;

namespace ArrayWatch.Simulation.Fields;

/// <summary>One part of the noise field. Immutable; parts are independent of each other.</summary>
public abstract record FieldSource
{
    /// <summary>Mean power at a sensor against frequency.</summary>
    public required Spectrum Spectrum { get; init; }

    /// <summary>How its level changes with time; null for steady.</summary>
    public ILevelCurve? Level { get; init; }

    /// <summary>Mean power at a sensor while <see cref="Level"/> is 0 dB, unit².</summary>
    public virtual double MeanPower(double frequencyHertz) => Spectrum.PowerAt(frequencyHertz);

    /// <summary>Amplitude factor of <see cref="Level"/> at a time.</summary>
    protected double AmplitudeAt(double sceneSeconds) => Level is null ? 1 : Decibels.ToAmplitude(Level.DecibelsAt(sceneSeconds));
}
