using ArrayWatch.Signals;

namespace ArrayWatch.NoiseField.Media;

/// <summary>Published equations for sea water, each in its own variables. <see cref="SoundSpeed.SeaWater"/> chooses between them.</summary>
public static class SeaWater
{
    /// <summary>Takes a temperature on today's scale (ITS-90) to the one of 1968: T68 = 1.00024 T90 (Saunders, 1990).</summary>
    /// <param name="temperature">°C, ITS-90.</param>
    /// <returns>°C, IPTS-68.</returns>
    public static double ToScaleOf1968(double temperature) => 1.00024 * temperature;

    /// <summary>
    /// Mackenzie's nine-term equation, J. Acoust. Soc. Am. 70, 807–812, 1981; standard error 0.07 m/s. The formula alone: the
    /// range it was made for (usually quoted as −2 or 2 to 30 °C, 25 to 40, 0 to 8000 m) is the caller's business.
    /// </summary>
    /// <param name="temperature68">°C, IPTS-68.</param>
    /// <param name="salinity">PSU.</param>
    /// <param name="depth">Metres.</param>
    /// <returns>m/s.</returns>
    public static double Mackenzie(double temperature68, double salinity, double depth)
    {
        double t = temperature68, s = salinity - 35;
        return 1448.96 + (t * (4.591 + (t * (-5.304e-2 + (t * 2.374e-4)))))
            + (1.340 * s) + (depth * (1.630e-2 + (depth * 1.675e-7)))
            - (1.025e-2 * t * s) - (7.139e-13 * t * depth * depth * depth);
    }

    /// <summary>
    /// Chen and Millero, J. Acoust. Soc. Am. 62, 1129–1135, 1977, as in Fofonoff and Millard, UNESCO Technical Papers in Marine
    /// Science 44, 1983: 0 to 40 °C, 0 to 40, 0 to 10 000 dbar; standard deviation 0.19 m/s. The formula alone.
    /// </summary>
    /// <param name="temperature68">°C, IPTS-68. The coefficients are those for that scale.</param>
    /// <param name="salinity">PSU, not negative.</param>
    /// <param name="pressure">Above the atmosphere's, dbar.</param>
    /// <returns>m/s.</returns>
    public static double ChenMillero(double temperature68, double salinity, double pressure)
    {
        double t = temperature68, p = pressure / 10;
        double water = Polynomial(t, 1402.388, 5.03711, -5.80852e-2, 3.3420e-4, -1.47800e-6, 3.1464e-9)
            + (p * (Polynomial(t, 0.153563, 6.8982e-4, -8.1788e-6, 1.3621e-7, -6.1185e-10)
            + (p * (Polynomial(t, 3.1260e-5, -1.7107e-6, 2.5974e-8, -2.5335e-10, 1.0405e-12)
            + (p * Polynomial(t, -9.7729e-9, 3.8504e-10, -2.3643e-12))))));
        double linear = Polynomial(t, 1.389, -1.262e-2, 7.164e-5, 2.006e-6, -3.21e-8)
            + (p * (Polynomial(t, 9.4742e-5, -1.2580e-5, -6.4885e-8, 1.0507e-8, -2.0122e-10)
            + (p * (Polynomial(t, -3.9064e-7, 9.1041e-9, -1.6002e-10, 7.988e-12)
            + (p * Polynomial(t, 1.100e-10, 6.649e-12, -3.389e-13))))));
        double threeHalves = Polynomial(t, -1.922e-2, -4.42e-5) + (p * Polynomial(t, 7.3637e-5, 1.7945e-7));
        double square = 1.727e-3 - (7.9836e-6 * p);
        return water + (salinity * (linear + (salinity * square) + (Math.Sqrt(salinity) * threeHalves)));
    }

    /// <summary>Pressure at a depth (Saunders, J. Phys. Oceanogr. 11, 573–574, 1981), standard ocean.</summary>
    /// <param name="depth">Metres, 0 to 12 000.</param>
    /// <param name="latitudeDegrees">−90 to 90; moves the pressure by at most 0.53 %.</param>
    /// <returns>dbar above the atmosphere's.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double PressureAtDepth(double depth, double latitudeDegrees)
    {
        Check.InRange(depth, 0, 12_000, "the depth in metres");
        Check.InRange(latitudeDegrees, -90, 90, "the latitude in degrees");
        double sine = Math.Sin(latitudeDegrees * Math.PI / 180);
        double linear = 1 - (5.92e-3 + (5.25e-3 * sine * sine));
        const double Square = 2.21e-6;
        // The smaller root of depth = linear·p − Square·p², in the form without cancellation.
        return 2 * depth / (linear + Math.Sqrt((linear * linear) - (4 * Square * depth)));
    }

    private static double Polynomial(double x, params ReadOnlySpan<double> coefficients)
    {
        double sum = 0;
        for (int i = coefficients.Length - 1; i >= 0; i--) sum = (sum * x) + coefficients[i];
        return sum;
    }
}
