using System.Numerics;
using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField.Coherence;

/// <summary>
/// Coherence of the pressure that turbulence carries over the sensors: a boundary layer on a hull or a
/// towed line, or wind over microphones. It decays with separation times frequency and travels with
/// the convection speed, not the speed of sound.
/// </summary>
/// <remarks>
/// Separable exponential form of Corcos, J. Acoust. Soc. Am. 35, 192–199, 1963:
/// Γ = exp(−α₁ω|ξ|/U_c) exp(−α₂ω|η|/U_c) exp(−jωξ/U_c), with ξ along and η across the flow. The sign: what
/// passes sensor m passes a sensor downstream of it later, so the downstream sensor lags. As physics the
/// constants hold to about ±30 %.
/// </remarks>
public static class TurbulentNoise
{
    /// <summary>Decay along the wind, Mirabilii and Habets, arXiv:1805.09679, 2018.</summary>
    public const double WindDecayAlong = 0.125;

    /// <summary>Decay across the wind, Mirabilii and Habets, arXiv:1805.09679, 2018.</summary>
    public const double WindDecayAcross = 0.7;

    /// <summary>Convection speed as a share of the wind speed, Mirabilii and Habets, arXiv:1805.09679, 2018.</summary>
    public const double WindConvectionShare = 0.8;

    /// <summary>Decay along a low-speed boundary layer, the value common in the literature after Corcos (1963).</summary>
    public const double BoundaryLayerDecayAlong = 0.11;

    /// <summary>Decay across a low-speed boundary layer, the value common in the literature after Corcos (1963).</summary>
    public const double BoundaryLayerDecayAcross = 0.7;

    /// <summary>Corcos coherence of a turbulent flow.</summary>
    /// <param name="separation">p_l − p_m, metres.</param>
    /// <param name="flow">Where the flow goes to; any non-zero length.</param>
    /// <param name="frequency">Hertz, not negative.</param>
    /// <param name="convectionSpeed">U_c, m/s, positive.</param>
    /// <param name="decayAlong">α₁, not negative.</param>
    /// <param name="decayAcross">α₂, not negative.</param>
    /// <returns>Γ = E[x_l x_m*] for unit powers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static Complex Corcos(
        Position separation, Position flow, double frequency, double convectionSpeed, double decayAlong, double decayAcross)
    {
        Check.InRange(frequency, 0, double.MaxValue, "the frequency in hertz");
        Check.Above(convectionSpeed, 0, "the convection speed in m/s");
        Check.InRange(decayAlong, 0, double.MaxValue, "the decay along the flow");
        Check.InRange(decayAcross, 0, double.MaxValue, "the decay across the flow");
        (double along, double across) = Wave.Split(separation, flow);
        double number = 2 * Math.PI * frequency / convectionSpeed;
        return Complex.FromPolarCoordinates(
            Math.Exp(-number * ((decayAlong * Math.Abs(along)) + (decayAcross * across))), -number * along);
    }

    /// <summary>Wind noise on microphones.</summary>
    /// <param name="separation">p_l − p_m, metres.</param>
    /// <param name="wind">Where the wind blows to; any non-zero length.</param>
    /// <param name="frequency">Hertz, not negative.</param>
    /// <param name="windSpeed">m/s, positive.</param>
    /// <returns>Γ = E[x_l x_m*] for unit powers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static Complex Wind(Position separation, Position wind, double frequency, double windSpeed)
        => Corcos(
            separation,
            wind,
            frequency,
            WindConvectionShare * Check.Above(windSpeed, 0, "the wind speed in m/s"),
            WindDecayAlong,
            WindDecayAcross);
}
