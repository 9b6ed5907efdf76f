namespace ArrayWatch.Simulation.Fields;

/// <summary>Sound of one place: rank one, a complex Gaussian amplitude a snapshot and bin times what the sensors see of it.</summary>
public abstract record WaveSource : FieldSource
{
    /// <summary>Adds one snapshot's sound at one bin.</summary>
    /// <param name="moment">Sensors, sound speed, frequency and time.</param>
    /// <param name="amplitude">Circular complex Gaussian of unit power, common to the sensors.</param>
    /// <param name="re">N real parts; added to.</param>
    /// <param name="im">N imaginary parts; added to.</param>
    public abstract void AddWave(SoundMoment moment, (double Re, double Im) amplitude, Span<double> re, Span<double> im);

    /// <summary>Adds a·e^{+jk u·p_n} for each sensor: a plane wave from unit vector u.</summary>
    private protected static void AddPlane(
        SoundMoment moment, Signals.Position toward, double ar, double ai, Span<double> re, Span<double> im)
    {
        double k = moment.Wavenumber;
        for (int n = 0; n < moment.Positions.Length; n++)
        {
            (double s, double c) = Math.SinCos(k * toward.Dot(moment.Positions[n]));
            re[n] += (ar * c) - (ai * s);
            im[n] += (ar * s) + (ai * c);
        }
    }
}
