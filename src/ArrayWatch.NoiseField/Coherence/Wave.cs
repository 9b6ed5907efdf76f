using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField.Coherence;

/// <summary>Wavenumber and the split of a displacement along and across an axis.</summary>
public static class Wave
{
    /// <summary>Wavenumber k = 2πf/c, rad/m.</summary>
    /// <param name="frequency">Hertz, finite and not negative.</param>
    /// <param name="soundSpeed">m/s, positive.</param>
    /// <returns>k.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A frequency or speed out of its range.</exception>
    public static double Number(double frequency, double soundSpeed)
    {
        Check.InRange(frequency, 0, double.MaxValue, "the frequency in hertz");
        Check.Above(soundSpeed, 0, "the sound speed in m/s");
        return 2 * Math.PI * frequency / soundSpeed;
    }

    /// <summary>Splits a displacement into its parts along an axis (signed) and square to it.</summary>
    /// <param name="separation">Metres.</param>
    /// <param name="axis">Any non-zero length.</param>
    /// <returns>Along: the scalar product with the unit axis; Across: not negative. Both in metres.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An axis without a finite, positive length.</exception>
    public static (double Along, double Across) Split(Position separation, Position axis)
    {
        double length = Check.Above(axis.Length, 0, "the length of the axis", nameof(axis));
        Position unit = (1 / length) * axis;
        double along = separation.Dot(unit);
        return (along, (separation - (along * unit)).Length);
    }
}
