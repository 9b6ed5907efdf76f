using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField.Media;

/// <summary>Humidity and absorption of sound in air, ISO 9613-1:1993.</summary>
public static class Air
{
    /// <summary>The standard's reference pressure, kPa.</summary>
    public const double ReferencePressureKilopascals = 101.325;

    private const double ReferenceKelvin = 293.15;
    private const double TriplePointKelvin = 273.16;

    /// <summary>Molar share of water vapour (ISO 9613-1:1993, annex B).</summary>
    /// <param name="temperature">°C, −50 to 60.</param>
    /// <param name="relativeHumidity">Percent, 0 to 100.</param>
    /// <param name="pressureKilopascals">20 to 120 kPa.</param>
    /// <returns>Percent.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double MolarHumidity(double temperature, double relativeHumidity, double pressureKilopascals)
    {
        Check.InRange(temperature, -50, 60, "the air temperature in °C");
        Check.InRange(relativeHumidity, 0, 100, "the relative humidity in percent");
        Check.InRange(pressureKilopascals, 20, 120, "the air pressure in kPa");
        double exponent = (-6.8346 * Math.Pow(TriplePointKelvin / (temperature + 273.15), 1.261)) + 4.6151;
        return relativeHumidity * Math.Pow(10, exponent) * ReferencePressureKilopascals / pressureKilopascals;
    }

    /// <summary>Attenuation of a pure tone by the atmosphere (ISO 9613-1:1993, equations 3 to 5).</summary>
    /// <param name="frequency">Hertz, 0 to 10⁶.</param>
    /// <param name="temperature">°C, −50 to 60.</param>
    /// <param name="relativeHumidity">Percent, 0 to 100.</param>
    /// <param name="pressureKilopascals">20 to 120 kPa.</param>
    /// <returns>dB/m; the standard states ±10 % for usual conditions.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double Absorption(
        double frequency, double temperature, double relativeHumidity, double pressureKilopascals = ReferencePressureKilopascals)
    {
        Check.InRange(frequency, 0, 1e6, "the frequency in hertz");
        double h = MolarHumidity(temperature, relativeHumidity, pressureKilopascals);
        double kelvin = temperature + 273.15, warmth = kelvin / ReferenceKelvin;
        double pressure = pressureKilopascals / ReferencePressureKilopascals, square = frequency * frequency;
        double oxygen = pressure * (24 + (4.04e4 * h * (0.02 + h) / (0.391 + h)));
        double nitrogen = pressure / Math.Sqrt(warmth) * (9 + (280 * h * Math.Exp(-4.170 * ((1 / Math.Cbrt(warmth)) - 1))));
        double relaxation = (0.01275 * Math.Exp(-2239.1 / kelvin) * oxygen / ((oxygen * oxygen) + square))
            + (0.1068 * Math.Exp(-3352.0 / kelvin) * nitrogen / ((nitrogen * nitrogen) + square));
        return 8.686 * square * ((1.84e-11 / pressure * Math.Sqrt(warmth)) + (Math.Pow(warmth, -2.5) * relaxation));
    }
}
