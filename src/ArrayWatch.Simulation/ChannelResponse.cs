namespace ArrayWatch.Simulation;

/// <summary>How one healthy channel answers: no two are quite alike.</summary>
/// <param name="GainDecibels">Amplitude, dB.</param>
/// <param name="PhaseDegrees">Phase, degrees.</param>
/// <param name="SelfNoiseDecibels">Level of its own noise, dB re <see cref="Scene.SelfNoise"/>.</param>
public readonly record struct ChannelResponse(double GainDecibels = 0, double PhaseDegrees = 0, double SelfNoiseDecibels = 0)
{
    /// <summary>Responses of a healthy array: independent Gaussian spreads.</summary>
    /// <param name="count">Number of channels.</param>
    /// <param name="gainSpreadDecibels">Deviation of gains, dB rms.</param>
    /// <param name="phaseSpreadDegrees">Deviation of phases, degrees rms.</param>
    /// <param name="selfNoiseSpreadDecibels">Deviation of self-noise levels, dB rms.</param>
    /// <param name="random">Draws them.</param>
    public static ChannelResponse[] Spread(
        int count, double gainSpreadDecibels, double phaseSpreadDegrees, double selfNoiseSpreadDecibels, RandomNumbers random)
    {
        ArgumentNullException.ThrowIfNull(random);
        return [.. Enumerable.Range(0, count).Select(_ => new ChannelResponse(
            gainSpreadDecibels * random.NextGaussian(), phaseSpreadDegrees * random.NextGaussian(), selfNoiseSpreadDecibels * random.NextGaussian()))];
    }
}
