using System.Numerics;
using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField.Coherence;

/// <summary>
/// Spatial coherence of noise that is concentrated about one direction with a von Mises law:
/// between isotropic noise (concentration κ = 0) and a plane wave (κ → ∞).
/// </summary>
public static class DirectionalNoise
{
    private const double LargestConcentration = 1e6;

    /// <summary>
    /// Arrivals over the whole sphere with density ∝ e^(κ u·μ) (von Mises–Fisher):
    /// Γ = (κ/sinh κ)·sinh η/η with η² = κ² − (kd)² + 2jκ k d·μ.
    /// </summary>
    /// <param name="separation">p_l − p_m, metres.</param>
    /// <param name="toward">μ, toward the mean direction of arrival; any non-zero length.</param>
    /// <param name="concentration">κ, 0 to 10⁶.</param>
    /// <param name="frequency">Hertz, not negative.</param>
    /// <param name="soundSpeed">m/s, positive.</param>
    /// <returns>Γ = E[x_l x_m*] for unit powers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    /// <remarks>Turbic, Kasparick and Stańczak, arXiv:2409.01647, 2024, give the elementary closed form.</remarks>
    public static Complex Spherical(Position separation, Position toward, double concentration, double frequency, double soundSpeed)
    {
        Check.InRange(concentration, 0, LargestConcentration, "the concentration");
        double k = Wave.Number(frequency, soundSpeed);
        Complex eta = Root(concentration, k * separation.Length, k * Wave.Split(separation, toward).Along);
        // Scaled by e^−κ above and below, so that large concentrations do not overflow.
        return ScaledSinhOver(eta, concentration) / ScaledSinhOver(concentration, concentration);
    }

    /// <summary>
    /// Arrivals in the plane square to <paramref name="axis"/> with density ∝ e^(κ cos(θ − μ)) (von Mises):
    /// Γ = I0(√(κ² − (kρ)² + 2jκ k ρ cos μ))/I0(κ) (Abdi and Kaveh, IEEE J. Sel. Areas Commun. 20, 2002),
    /// here as the mean over the circle that it stands for.
    /// </summary>
    /// <param name="separation">p_l − p_m, metres; its part along the axis does not count.</param>
    /// <param name="toward">The mean direction of arrival; its part along the axis does not count.</param>
    /// <param name="axis">Square to the plane of arrivals, most often the vertical; any non-zero length.</param>
    /// <param name="concentration">κ, 0 to 10⁶.</param>
    /// <param name="frequency">Hertz, not negative.</param>
    /// <param name="soundSpeed">m/s, positive.</param>
    /// <returns>Γ = E[x_l x_m*] for unit powers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range, or a direction along the axis.</exception>
    public static Complex Cylindrical(
        Position separation, Position toward, Position axis, double concentration, double frequency, double soundSpeed)
    {
        Check.InRange(concentration, 0, LargestConcentration, "the concentration");
        double k = Wave.Number(frequency, soundSpeed);
        Position flat = InPlane(separation, axis), mean = InPlane(toward, axis);
        (double along, double across) = Wave.Split(flat, mean);
        return CircleMean(concentration, k * along, k * across);
    }

    /// <summary>
    /// The trapezoidal rule on the circle, exact to rounding once the points outnumber the harmonics of the
    /// integrand (those of e^(κ cos θ) fall as e^(−n²/2κ), those of e^(jx cos θ) beyond n = x).
    /// </summary>
    private static Complex CircleMean(double concentration, double along, double across)
    {
        double x = Math.Sqrt((along * along) + (across * across));
        int points = 40 + (int)Math.Ceiling(Check.InRange(x, 0, 1e5, "the separation in radians") + (12 * Math.Cbrt(x)) + (10 * Math.Sqrt(concentration)));
        double total = 0, re = 0, im = 0;
        for (int i = 0; i < points; i++)
        {
            (double sine, double cosine) = Math.SinCos(2 * Math.PI * i / points);
            double weight = Math.Exp(concentration * (cosine - 1));
            (double phaseSine, double phaseCosine) = Math.SinCos((along * cosine) + (across * sine));
            total += weight;
            re += weight * phaseCosine;
            im += weight * phaseSine;
        }

        return new Complex(re / total, im / total);
    }

    private static Position InPlane(Position p, Position axis)
    {
        Position unit = (1 / Check.Above(axis.Length, 0, "the length of the axis")) * axis;
        return p - (p.Dot(unit) * unit);
    }

    private static Complex Root(double concentration, double x, double along)
    {
        Complex root = Complex.Sqrt(new Complex((concentration - x) * (concentration + x), 2 * concentration * along));
        return root.Real < 0 ? -root : root;
    }

    private static Complex ScaledSinhOver(Complex eta, double scale)
    {
        if (Complex.Abs(eta) < 1e-4) return (1 + (eta * eta / 6)) * Math.Exp(-scale);
        return (Complex.Exp(eta - scale) - Complex.Exp(-eta - scale)) / (2 * eta);
    }
}
