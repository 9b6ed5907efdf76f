using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Fields;

/// <summary>
/// Plane waves of equal power from every bearing, all at elevation zero: coherence J₀(kd) of the
/// horizontal (xy) distance.
/// </summary>
public sealed record CylindricalIsotropicNoise : HomogeneousDiffuse
{
    /// <inheritdoc/>
    protected override (double Re, double Im) Coherence(Position separation, SoundMoment moment) =>
        (Bessel.J0(moment.Wavenumber * Math.Sqrt((separation.X * separation.X) + (separation.Y * separation.Y))), 0);
}
