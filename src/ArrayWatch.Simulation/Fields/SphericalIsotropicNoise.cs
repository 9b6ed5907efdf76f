using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Fields;

/// <summary>
/// Plane waves of equal power from everywhere: coherence sin(kd)/(kd) (R. K. Cook et al., "Measurement
/// of correlation coefficients in reverberant sound fields", JASA 27, 1955).
/// </summary>
public sealed record SphericalIsotropicNoise : HomogeneousDiffuse
{
    /// <inheritdoc/>
    protected override (double Re, double Im) Coherence(Position separation, SoundMoment moment)
    {
        double x = moment.Wavenumber * separation.Length;
        return (x < 1e-9 ? 1 : Math.Sin(x) / x, 0);
    }
}
