namespace ArrayWatch.Simulation.Faults;

/// <summary>Sign reversed: two wires exchanged.</summary>
public sealed record PolarityFault : Fault
{
    /// <inheritdoc/>
    public override string Kind => "polarity";

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
        foreach (int n in Channels) Multiply(n, -1, 0, re, im);
    }
}
