using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Fields;

/// <summary>
/// Shots, pings, slammed doors: one in each slot of time, at a random moment in the slot and from a random
/// direction, for as long as stated. <see cref="FieldSource.Spectrum"/> is the level while one lasts.
/// </summary>
public sealed record Transients : WaveSource
{
    /// <summary>Length of a slot: mean time between shots, seconds.</summary>
    public required double SlotSeconds { get; init; }

    /// <summary>How long a shot lasts, seconds; less than a slot.</summary>
    public required double DurationSeconds { get; init; }

    /// <summary>Start value of the generator that draws moments and directions.</summary>
    public required ulong StartValue { get; init; }

    /// <summary>0: transients are no part of the mean field.</summary>
    public override double MeanPower(double frequencyHertz) => 0;

    /// <inheritdoc/>
    public override void AddWave(SoundMoment moment, (double Re, double Im) amplitude, Span<double> re, Span<double> im)
    {
        long slot = (long)Math.Floor(moment.SceneSeconds / SlotSeconds);
        RandomNumbers random = new RandomNumbers(StartValue).Fork(slot);
        double begin = (slot * SlotSeconds) + random.Between(0, SlotSeconds - DurationSeconds);
        if (moment.SceneSeconds < begin || moment.SceneSeconds >= begin + DurationSeconds) return;
        Position toward = random.NextDirection();
        double a = Math.Sqrt(Spectrum.PowerAt(moment.FrequencyHertz)) * AmplitudeAt(moment.SceneSeconds);
        AddPlane(moment, toward, a * amplitude.Re, a * amplitude.Im, re, im);
    }
}
