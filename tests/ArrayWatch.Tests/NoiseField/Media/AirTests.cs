using ArrayWatch.NoiseField.Media;

namespace ArrayWatch.Tests.NoiseField.Media;

public sealed class AirTests
{
    // ISO 9613-1:1993: c = 343.2 √(T/293.15).
    [Theory]
    [InlineData(-20, 318.927006)]
    [InlineData(0, 331.285885)]
    [InlineData(20, 343.2)]
    [InlineData(40, 354.714170)]
    public void Dry_air_has_the_standards_speed(double temperature, double expected) => Assert.Equal(expected, SoundSpeed.Air(temperature), 1e-6);

    // Cramer, J. Acoust. Soc. Am. 93, 2510–2516, 1993, equation 15 with 400 ppm of CO2 (coefficients from memory); stated
    // uncertainty 300 ppm. The ideal gas of the standard is 0.15 m/s below it already when dry.
    [Theory]
    [InlineData(15, 60)]
    [InlineData(20, 50)]
    [InlineData(30, 100)]
    [InlineData(5, 90)]
    public void Moist_air_agrees_with_cramer(double t, double humidity)
    {
        double x = Air.MolarHumidity(t, humidity, 101.325) / 100;
        const double Dioxide = 0.0004, Pascals = 101_325;
        double cramer = 331.5024 + (0.603055 * t) - (0.000528 * t * t)
            + ((51.471935 + (0.1495874 * t) - (0.000782 * t * t)) * x)
            + ((-1.82e-7 + (3.73e-8 * t) - (2.93e-10 * t * t)) * Pascals)
            + ((-85.20931 - (0.228525 * t) + (5.91e-5 * t * t)) * Dioxide)
            - (2.835149 * x * x) - (2.15e-13 * Pascals * Pascals) + (29.179762 * Dioxide * Dioxide) + (0.000486 * x * Pascals * Dioxide);
        Assert.Equal(cramer, SoundSpeed.Air(t, humidity), 0.25);
    }

    // ISO 9613-1:1993, annex B, arithmetic: 1.6142524718 % at 20 °C, 70 %.
    [Fact]
    public void Molar_humidity_has_the_standards_value()
    {
        Assert.Equal(1.6142524718, Air.MolarHumidity(20, 70, 101.325), 1e-8);
        Assert.Equal(4.977810847e-3, Air.Absorption(1000, 20, 70), 1e-11);
    }

    // ISO 9613-2:1996, Table 2, dB/km at exact octave midbands; the cell 15 °C, 80 %, 1 kHz is printed 0.051 off its formula.
    [Theory]
    [InlineData(10, 70, new[] { 0.1, 0.4, 1.0, 1.9, 3.7, 9.7, 32.8, 117 })]
    [InlineData(20, 70, new[] { 0.1, 0.3, 1.1, 2.8, 5.0, 9.0, 22.9, 76.6 })]
    [InlineData(30, 70, new[] { 0.1, 0.3, 1.0, 3.1, 7.4, 12.7, 23.1, 59.3 })]
    [InlineData(15, 20, new[] { 0.3, 0.6, 1.2, 2.7, 8.2, 28.2, 88.8, 202 })]
    [InlineData(15, 50, new[] { 0.1, 0.5, 1.2, 2.2, 4.2, 10.8, 36.2, 129 })]
    [InlineData(15, 80, new[] { 0.1, 0.3, 1.1, 2.4, 4.1, 8.3, 23.7, 82.8 })]
    public void Absorption_has_the_table_of_the_octaves(double temperature, double humidity, double[] row)
    {
        for (int i = 0; i < 8; i++)
        {
            double perKilometre = 1000 * Air.Absorption(1000 * Math.Pow(10, 0.3 * (i - 4)), temperature, humidity);
            Assert.Equal(row[i], perKilometre, row[i] >= 100 ? 0.5 : 0.052);
        }
    }

    // ISO 9613-1:1993, Table 1, dB/km to three figures, one-third octaves 50 Hz to 10 kHz.
    [Theory]
    [InlineData(-20, 10, new[] { 0.589, 0.756, 0.924, 1.08, 1.20, 1.30, 1.37, 1.43, 1.46, 1.49, 1.52, 1.55, 1.59, 1.65, 1.74, 1.88, 2.10, 2.44, 2.99, 3.86, 5.24, 7.42, 10.9, 16.4 })]
    [InlineData(-15, 30, new[] { 0.212, 0.305, 0.446, 0.660, 0.979, 1.45, 2.10, 2.97, 4.05, 5.27, 6.52, 7.67, 8.65, 9.44, 10.1, 10.6, 11.0, 11.5, 12.2, 13.1, 14.6, 16.8, 20.3, 25.9 })]
    [InlineData(25, 80, new[] { 0.0426, 0.0673, 0.106, 0.167, 0.262, 0.409, 0.631, 0.963, 1.44, 2.10, 2.95, 3.97, 5.12, 6.35, 7.62, 9.01, 10.7, 12.9, 16.2, 21.1, 28.8, 40.8, 59.8, 89.6 })]
    public void Absorption_has_the_table_of_the_third_octaves(double temperature, double humidity, double[] row)
    {
        for (int i = 0; i < row.Length; i++)
        {
            double perKilometre = 1000 * Air.Absorption(1000 * Math.Pow(10, 0.1 * (i - 13)), temperature, humidity);
            double unit = Math.Pow(10, Math.Floor(Math.Log10(perKilometre)) - 2);
            Assert.Equal(row[i], perKilometre, 0.5001 * unit);
        }
    }

    [Fact]
    public void Air_out_of_range_is_refused_with_value_and_range()
    {
        ArgumentOutOfRangeException e = Assert.Throws<ArgumentOutOfRangeException>(() => SoundSpeed.Air(20, 101));
        Assert.Contains("relative humidity in percent is 101; 0 to 100", e.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => SoundSpeed.Air(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => SoundSpeed.Air(20, 50, 101325));
        Assert.Throws<ArgumentOutOfRangeException>(() => Air.Absorption(-1, 20, 50));
    }
}
