using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField.Coherence;

/// <summary>Spatial coherence of noise that arrives with equal power from every direction.</summary>
public static class IsotropicNoise
{
    /// <summary>
    /// Spherically isotropic noise, Γ = sin(kd)/(kd) with k = 2πf/c (Cook, Waterhouse, Berendt, Edelman and
    /// Thompson, J. Acoust. Soc. Am. 27, 1072, 1955).
    /// </summary>
    /// <param name="separation">p_l − p_m, metres.</param>
    /// <param name="frequency">Hertz, not negative.</param>
    /// <param name="soundSpeed">m/s, positive.</param>
    /// <returns>Γ, real, −0.217 to 1.</returns>
    public static double Spherical(Position separation, double frequency, double soundSpeed)
        => Sinc(Wave.Number(frequency, soundSpeed) * separation.Length);

    /// <summary>
    /// Cylindrically isotropic noise, Γ = J0(kρ): plane waves from every direction square to
    /// <paramref name="axis"/>, ρ being the part of the separation square to it (Jacobi–Anger; Cox, J. Acoust.
    /// Soc. Am. 54, 1289, 1973).
    /// </summary>
    /// <param name="separation">p_l − p_m, metres.</param>
    /// <param name="axis">Axis of the cylinder, most often the vertical; any non-zero length.</param>
    /// <param name="frequency">Hertz, not negative.</param>
    /// <param name="soundSpeed">m/s, positive.</param>
    /// <returns>Γ, real, −0.403 to 1.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An axis without a length.</exception>
    public static double Cylindrical(Position separation, Position axis, double frequency, double soundSpeed)
        => Bessel.J0(Wave.Number(frequency, soundSpeed) * Wave.Split(separation, axis).Across);

    /// <summary>sin(x)/x, 1 at x = 0.</summary>
    /// <param name="x">Any number; NaN gives NaN, ±∞ gives 0.</param>
    /// <returns>The value.</returns>
    public static double Sinc(double x)
    {
        if (double.IsInfinity(x)) return 0;
        return Math.Abs(x) < 1e-8 ? 1 : Math.Sin(x) / x;
    }
}
