using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField.Media;

/// <summary>Speed of sound from what the platform measures.</summary>
public static class SoundSpeed
{
    /// <summary>
    /// Sea water: Mackenzie (1981) from −2 to 30 °C, 25 to 40 PSU and 0 to 8000 m; elsewhere Chen and Millero (UNESCO 1983) with
    /// the pressure by Saunders (1981) at 45° of latitude. At the change from one to the other the two differ by less than 0.45 m/s
    /// down to 200 m; below, in waters that no ocean holds (30 °C or 25 PSU at 2000 m), by more than 1 m/s.
    /// </summary>
    /// <param name="temperature">°C on today's scale (ITS-90): −2 to 40, at least 0 outside Mackenzie's range.</param>
    /// <param name="salinity">PSU, 0 to 42 (beyond 40 is a short extrapolation, for the Red Sea and the Gulf).</param>
    /// <param name="depth">Metres, 0 to 9700.</param>
    /// <returns>m/s; standard error 0.1 to 0.2 m/s where the inputs are exact.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range; the message has the value and the range.</exception>
    public static double SeaWater(double temperature, double salinity, double depth)
    {
        Check.InRange(temperature, -2, 40, "the water temperature in °C");
        Check.InRange(salinity, 0, 42, "the salinity in PSU");
        Check.InRange(depth, 0, 9700, "the depth in metres");
        double scaled = Media.SeaWater.ToScaleOf1968(temperature);
        if (temperature <= 30 && salinity is >= 25 and <= 40 && depth <= 8000)
            return Media.SeaWater.Mackenzie(scaled, salinity, depth);
        Check.InRange(temperature, 0, 40, "the water temperature in °C, with salinity below 25 or above 40 PSU or depth beyond 8000 m,");
        return Media.SeaWater.ChenMillero(scaled, salinity, Media.SeaWater.PressureAtDepth(depth, 45));
    }

    /// <summary>
    /// Air: 343.2 √(T/293.15) m/s (ISO 9613-1:1993) for dry air, times √(γ M₀/(γ₀ M)) for the water vapour in it, with
    /// γ = (7 + h)/(5 + h) and M = 28.966 − 10.95 h for a molar share h (Bohn, J. Audio Eng. Soc. 36, 223–231, 1988).
    /// </summary>
    /// <param name="temperature">°C, −50 to 60.</param>
    /// <param name="relativeHumidity">Percent, 0 to 100.</param>
    /// <param name="pressureKilopascals">20 to 120 kPa; matters by way of the humidity alone.</param>
    /// <returns>m/s.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range; the message has the value and the range.</exception>
    public static double Air(double temperature, double relativeHumidity = 0, double pressureKilopascals = Media.Air.ReferencePressureKilopascals)
    {
        double h = Media.Air.MolarHumidity(temperature, relativeHumidity, pressureKilopascals) / 100;
        double vapour = (7 + h) / (5 + h) / 1.4 * 28.966 / (28.966 - (10.95 * h));
        return 343.2 * Math.Sqrt((temperature + 273.15) / 293.15 * vapour);
    }
}
