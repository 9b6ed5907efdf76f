namespace ArrayWatch.Simulation.Faults;

/// <summary>Noise of its own on each channel, independent of everything.</summary>
public sealed record ExcessNoiseFault : Fault
{
    /// <summary>Rise of a channel's power over that of the field, dB, positive: the noise added is 10^(x/10) − 1 times the field.</summary>
    public required double ExcessDecibels { get; init; }

    /// <inheritdoc/>
    public override string Kind => "excess-noise";

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
        double a = Math.Sqrt(moment.FieldPower * (Decibels.ToPower(ExcessDecibels) - 1));
        foreach (int n in Channels)
        {
            (double zr, double zi) = moment.Random.NextComplexGaussian();
            re[n] += a * zr;
            im[n] += a * zi;
        }
    }
}
