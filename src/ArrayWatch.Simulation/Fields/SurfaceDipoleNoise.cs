using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Fields;

/// <summary>
/// Sound of a surface above (+z) covered with vertical dipoles (B. F. Cron, C. H. Sherman, "Spatial-correlation
/// functions for various noise models", JASA 34, 1962): power ∝ cos α from angle α off the zenith, so that
/// the coherence is 2 ∫₀¹ μ J₀(kρ√(1−μ²)) e^{jkzμ} dμ; 2 J₁(kρ)/(kρ) for sensors at one depth.
/// </summary>
public sealed record SurfaceDipoleNoise : HomogeneousDiffuse
{
    /// <inheritdoc/>
    protected override (double Re, double Im) Coherence(Position separation, SoundMoment moment)
    {
        double rho = moment.Wavenumber * Math.Sqrt((separation.X * separation.X) + (separation.Y * separation.Y));
        double z = moment.Wavenumber * separation.Z;
        if (z == 0) return (rho < 1e-9 ? 1 : 2 * Bessel.J1(rho) / rho, 0);

        // Midpoints in μ²: 2μ dμ = d(μ²), so the weights are even; the count follows the fastest phase.
        int steps = 400 + (int)(8 * (rho + Math.Abs(z)));
        double re = 0, im = 0;
        for (int i = 0; i < steps; i++)
        {
            double square = (i + 0.5) / steps, mu = Math.Sqrt(square);
            double j0 = Bessel.J0(rho * Math.Sqrt(1 - square));
            re += j0 * Math.Cos(z * mu);
            im += j0 * Math.Sin(z * mu);
        }

        return (re / steps, im / steps);
    }
}
