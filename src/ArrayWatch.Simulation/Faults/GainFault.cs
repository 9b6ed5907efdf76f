namespace ArrayWatch.Simulation.Faults;

/// <summary>Amplitude wrong by the same factor at every frequency.</summary>
public sealed record GainFault : Fault
{
    /// <summary>Amplitude, dB.</summary>
    public required double GainDecibels { get; init; }

    /// <inheritdoc/>
    public override string Kind => "gain";

    /// <inheritdoc/>
    public override void OnSound(FaultMoment moment, Span<double> re, Span<double> im)
    {
        double g = Decibels.ToAmplitude(GainDecibels);
        foreach (int n in Channels) Multiply(n, g, 0, re, im);
    }
}
