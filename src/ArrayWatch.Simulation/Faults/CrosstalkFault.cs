namespace ArrayWatch.Simulation.Faults;

/// <summary>One channel leaks into another.</summary>
public sealed record CrosstalkFault : Fault
{
    /// <summary>The channel that leaks.</summary>
    public required int From { get; init; }

    /// <summary>Amplitude of the leak, dB re the leaking channel.</summary>
    public required double LevelDecibels { get; init; }

    /// <summary>Phase that the leak gives, degrees.</summary>
    public double PhaseDegrees { get; init; }

    /// <inheritdoc/>
    public override string Kind => "crosstalk";

    /// <summary>A leak into one channel.</summary>
    public static CrosstalkFault Between(int from, int into, double levelDecibels, double phaseDegrees = 0) =>
        new() { Channels = [into], From = from, LevelDecibels = levelDecibels, PhaseDegrees = phaseDegrees };

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
        double a = Decibels.ToAmplitude(LevelDecibels);
        (double s, double c) = Math.SinCos(PhaseDegrees * Math.PI / 180);
        double fr = re[From], fi = im[From];
        foreach (int n in Channels)
        {
            re[n] += a * ((fr * c) - (fi * s));
            im[n] += a * ((fr * s) + (fi * c));
        }
    }
}
