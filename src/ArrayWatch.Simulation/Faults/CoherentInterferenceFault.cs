namespace ArrayWatch.Simulation.Faults;

/// <summary>
/// One waveform that enters channels by a circuit, not through the medium: hum of the mains, a switching
/// supply. Each channel has a fixed complex share of it, which no wave need resemble.
/// </summary>
public sealed record CoherentInterferenceFault : Fault
{
    /// <summary>0-based bins that it enters.</summary>
    public required IReadOnlyList<int> Bins { get; init; }

    /// <summary>Each channel's level, dB re the field's mean power in the bin; one for each of <see cref="Fault.Channels"/>.</summary>
    public required IReadOnlyList<double> ChannelDecibels { get; init; }

    /// <summary>Each channel's phase, degrees; one for each of <see cref="Fault.Channels"/>.</summary>
    public required IReadOnlyList<double> ChannelPhasesDegrees { get; init; }

    /// <summary>True for a pure tone of constant amplitude and random phase from snapshot to snapshot; false for narrowband noise.</summary>
    public bool IsTone { get; init; }

    /// <inheritdoc/>
    public override string Kind => "coherent-interference";

    /// <summary>Interference of one mean level with random phases and a spread of levels over its channels.</summary>
    /// <param name="channels">Channels it enters, ascending.</param>
    /// <param name="bins">Bins it enters.</param>
    /// <param name="levelDecibels">Mean level, dB re the field.</param>
    /// <param name="spreadDecibels">Deviation of levels over channels, dB rms.</param>
    /// <param name="random">Draws the pattern.</param>
    public static CoherentInterferenceFault RandomPattern(
        IReadOnlyList<int> channels, IReadOnlyList<int> bins, double levelDecibels, double spreadDecibels, RandomNumbers random)
    {
        ArgumentNullException.ThrowIfNull(channels);
        ArgumentNullException.ThrowIfNull(random);
        return new()
        {
            Channels = channels,
            Bins = bins,
            ChannelDecibels = [.. channels.Select(_ => levelDecibels + (spreadDecibels * random.NextGaussian()))],
            ChannelPhasesDegrees = [.. channels.Select(_ => random.Between(-180, 180))],
        };
    }

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
        if (!Bins.Contains(moment.Bin)) return;
        (double wr, double wi) = moment.Random.NextComplexGaussian();
        double norm = Math.Sqrt(moment.FieldPower) / (IsTone ? Math.Sqrt((wr * wr) + (wi * wi)) : 1);
        for (int i = 0; i < Channels.Count; i++)
        {
            double a = norm * Decibels.ToAmplitude(ChannelDecibels[i]);
            (double s, double c) = Math.SinCos(ChannelPhasesDegrees[i] * Math.PI / 180);
            re[Channels[i]] += a * ((wr * c) - (wi * s));
            im[Channels[i]] += a * ((wr * s) + (wi * c));
        }
    }
}
