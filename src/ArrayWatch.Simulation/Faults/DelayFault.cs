namespace ArrayWatch.Simulation.Faults;

/// <summary>Channels late by a constant time.</summary>
public sealed record DelayFault : Fault
{
    /// <summary>Time error, microseconds; positive when the channel is late, so that its data turn by e^{−j2πfτ}.</summary>
    public required double DelayMicroseconds { get; init; }

    /// <inheritdoc/>
    public override string Kind => "delay";

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
        (double s, double c) = Math.SinCos(-2 * Math.PI * moment.FrequencyHertz * DelayMicroseconds * 1e-6);
        foreach (int n in Channels) Multiply(n, c, s, re, im);
    }
}
