using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField.Coherence;

/// <summary>
/// What an array receives from one source, in the e^{+jωt} convention: x_n ∝ e^(+j2πf u·p_n/c) for a plane
/// wave from the unit vector u, so a sensor nearer the source leads.
/// </summary>
public static class SteeringVector
{
    /// <summary>Writes the steering vector of a plane wave: unit magnitudes, phase 0 at the origin.</summary>
    /// <param name="geometry">Where the N channels are.</param>
    /// <param name="toward">Toward the source; any non-zero length.</param>
    /// <param name="frequency">Hertz, not negative.</param>
    /// <param name="soundSpeed">m/s, positive.</param>
    /// <param name="re">N values; receives the real parts.</param>
    /// <param name="im">N values; receives the imaginary parts.</param>
    /// <exception cref="ArgumentException">A span that does not hold N values.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A direction, frequency or speed out of its range.</exception>
    public static void PlaneWave(
        ArrayGeometry geometry, Position toward, double frequency, double soundSpeed, Span<double> re, Span<double> im)
    {
        int n = Checked(geometry, re, im);
        double length = Check.Above(toward.Length, 0, "the length of the direction", nameof(toward));
        Position slowness = (Wave.Number(frequency, soundSpeed) / length) * toward;
        for (int i = 0; i < n; i++) (im[i], re[i]) = Math.SinCos(slowness.Dot(geometry[i]));
    }

    /// <summary>
    /// Writes the steering vector of a point source: amplitudes ∝ 1/r_n scaled to a mean square of one, phases
    /// −k(r_n − r̄) with r̄ the mean distance, so that a far source tends to the plane wave up to one common phase.
    /// </summary>
    /// <param name="geometry">Where the N channels are.</param>
    /// <param name="source">Where the source is, metres; at least a micrometre from every channel.</param>
    /// <param name="frequency">Hertz, not negative.</param>
    /// <param name="soundSpeed">m/s, positive.</param>
    /// <param name="re">N values; receives the real parts.</param>
    /// <param name="im">N values; receives the imaginary parts.</param>
    /// <exception cref="ArgumentException">A span that does not hold N values.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A frequency or speed out of its range, or a source at a channel.</exception>
    public static void PointSource(
        ArrayGeometry geometry, Position source, double frequency, double soundSpeed, Span<double> re, Span<double> im)
    {
        int n = Checked(geometry, re, im);
        double k = Wave.Number(frequency, soundSpeed), mean = 0, power = 0;
        for (int i = 0; i < n; i++)
        {
            double distance = Check.Above(
                source.DistanceTo(geometry[i]), 1e-6, $"the distance of the source from channel '{geometry.Channels[i].Label}' in metres", nameof(source));
            re[i] = distance;
            mean += distance / n;
            power += 1 / (distance * distance * n);
        }

        double scale = 1 / Math.Sqrt(power);
        for (int i = 0; i < n; i++)
        {
            double distance = re[i];
            (double sine, double cosine) = Math.SinCos(-k * (distance - mean));
            (re[i], im[i]) = (scale / distance * cosine, scale / distance * sine);
        }
    }

    private static int Checked(ArrayGeometry geometry, Span<double> re, Span<double> im)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        if (re.Length != geometry.Count || im.Length != geometry.Count)
            throw new ArgumentException($"{re.Length} and {im.Length} places do not hold {geometry.Count} channels", nameof(re));
        return geometry.Count;
    }
}
