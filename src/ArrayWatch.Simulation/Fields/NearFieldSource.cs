using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Fields;

/// <summary>A point source so near that its wave front is curved: x_n ∝ e^{−jk r_n}/r_n, with its level at the array's middle.</summary>
public sealed record NearFieldSource : WaveSource
{
    /// <summary>Where it is, metres; not at a sensor.</summary>
    public required Position At { get; init; }

    /// <inheritdoc/>
    public override void AddWave(SoundMoment moment, (double Re, double Im) amplitude, Span<double> re, Span<double> im)
    {
        Position middle = default;
        foreach (Position p in moment.Positions) middle += p;
        double reference = At.DistanceTo((1.0 / moment.Positions.Length) * middle);
        double a = Math.Sqrt(Spectrum.PowerAt(moment.FrequencyHertz)) * AmplitudeAt(moment.SceneSeconds);
        double k = moment.Wavenumber;
        for (int n = 0; n < moment.Positions.Length; n++)
        {
            double r = Math.Max(At.DistanceTo(moment.Positions[n]), 1e-3 * reference), g = a * reference / r;
            (double s, double c) = Math.SinCos(-k * (r - reference));
            re[n] += g * ((amplitude.Re * c) - (amplitude.Im * s));
            im[n] += g * ((amplitude.Re * s) + (amplitude.Im * c));
        }
    }
}
