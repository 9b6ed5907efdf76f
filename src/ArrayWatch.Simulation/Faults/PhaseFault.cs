namespace ArrayWatch.Simulation.Faults;

/// <summary>Phase turned by the same angle at every frequency.</summary>
public sealed record PhaseFault : Fault
{
    /// <summary>Angle, degrees; the channel's data are multiplied by e^{+jφ}.</summary>
    public required double PhaseDegrees { get; init; }

    /// <inheritdoc/>
    public override string Kind => "phase";

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
        (double s, double c) = Math.SinCos(PhaseDegrees * Math.PI / 180);
        foreach (int n in Channels) Multiply(n, c, s, re, im);
    }
}
