namespace ArrayWatch.Simulation.Faults;

/// <summary>No sound reaches the channels: only electrical noise is left, or exact zeros.</summary>
public sealed record DeadFault : Fault
{
    /// <summary>Level of what is left, dB re the field's mean power in each bin; null for exact zeros.</summary>
    public double? RemainingDecibels { get; init; }

    /// <inheritdoc/>
    public override string Kind => "dead";

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
        double amplitude = RemainingDecibels is { } level ? Math.Sqrt(moment.FieldPower) * Decibels.ToAmplitude(level) : 0;
        foreach (int n in Channels)
        {
            (double zr, double zi) = amplitude > 0 ? moment.Random.NextComplexGaussian() : (0, 0);
            re[n] = amplitude * zr;
            im[n] = amplitude * zi;
        }
    }
}
