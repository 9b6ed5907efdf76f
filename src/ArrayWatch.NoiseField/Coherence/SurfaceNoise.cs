using System.Numerics;
using ArrayWatch.Signals;
using ArrayWatch.Signals.Statistics;

namespace ArrayWatch.NoiseField.Coherence;

/// <summary>
/// Spatial coherence of noise made at the sea surface: independent sources spread over a plane above the
/// array, each radiating with amplitude cosᵐα, α from the vertical; m = 1 is a vertical dipole.
/// </summary>
/// <remarks>
/// Seen from below, the power arriving per solid angle is proportional to cos^(2m−1)α over the upper
/// half space, whatever the depth (spherical spreading cancels the area seen). Hence, with ζ and ρ
/// the parts of the separation along and square to the vertical,
/// Γ = 2m ∫₀¹ u^(2m−1) e^(jkζu) J0(kρ√(1−u²)) du, here by Gauss–Legendre quadrature: the integrand is entire in u, so
/// the error falls faster than any power once the nodes outnumber the oscillations. For a horizontal pair this is
/// 2ᵐ m! J_m(kρ)/(kρ)ᵐ, for a vertical one and m = 1 its real part is 2[sin x/x + (cos x − 1)/x²], both due to
/// Cron and Sherman, J. Acoust. Soc. Am. 34, 1732–1736, 1962 (their result is the real part).
/// </remarks>
public static class SurfaceNoise
{
    private const double LargestArgument = 4000;

    /// <summary>Complex coherence of two sensors under a surface of vertical dipoles or sharper sources.</summary>
    /// <param name="separation">p_l − p_m, metres.</param>
    /// <param name="up">From the array toward the surface; any non-zero length.</param>
    /// <param name="frequency">Hertz, not negative.</param>
    /// <param name="soundSpeed">m/s, positive.</param>
    /// <param name="order">m, the exponent of the sources' directivity, 1 to 8.</param>
    /// <returns>Γ = E[x_l x_m*] for unit powers; the upper sensor leads.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range, or a pair more than 600 wavelengths apart.</exception>
    public static Complex Coherence(Position separation, Position up, double frequency, double soundSpeed, int order = 1)
    {
        double k = Wave.Number(frequency, soundSpeed);
        (double along, double across) = Wave.Split(separation, up);
        return Coherence(k * along, k * across, order);
    }

    /// <summary>The same by the dimensionless separations.</summary>
    /// <param name="vertical">kζ, radians.</param>
    /// <param name="horizontal">kρ, radians.</param>
    /// <param name="order">m, 1 to 8.</param>
    /// <returns>Γ.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static Complex Coherence(double vertical, double horizontal, int order = 1)
    {
        Check.InRange(vertical, -LargestArgument, LargestArgument, "the vertical separation in radians");
        Check.InRange(horizontal, -LargestArgument, LargestArgument, "the horizontal separation in radians");
        ArgumentOutOfRangeException.ThrowIfLessThan(order, 1);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(order, 8);
        if (vertical == 0 && order == 1) return HorizontalDipoles(horizontal);
        // A rule of n nodes follows e^(jxu) once 2n exceeds x/2, and J0(x√(1−u²)), steeper near u = 1, once it exceeds x/√2, each by a few
        // times the cube root; in eights, so that few rules are made.
        double v = Math.Abs(vertical), h = Math.Abs(horizontal);
        GaussLegendre rule = GaussLegendre.WithNodes(8 * (int)Math.Ceiling((11 + order + (0.25 * v) + (0.36 * h) + (3 * Math.Cbrt(v + h))) / 8));
        double re = 0, im = 0;
        for (int i = 0; i < rule.Nodes.Length; i++)
        {
            double u = rule.Nodes[i];
            double directivity = order == 1 ? u : Math.Pow(u, (2 * order) - 1);
            double density = rule.Weights[i] * directivity * Bessel.J0(horizontal * Math.Sqrt((1 - u) * (1 + u)));
            (double sine, double cosine) = Math.SinCos(vertical * u);
            re += density * cosine;
            im += density * sine;
        }

        return new Complex(2 * order * re, 2 * order * im);
    }

    private static double HorizontalDipoles(double x) => Math.Abs(x) < 1e-6 ? 1 - (x * x / 8) : 2 * Bessel.J1(x) / x;
}
