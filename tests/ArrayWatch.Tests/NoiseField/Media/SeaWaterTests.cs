using ArrayWatch.NoiseField.Media;
using ArrayWatch.Tests.Signals.Statistics;
using CsCheck;

namespace ArrayWatch.Tests.NoiseField.Media;

public sealed class SeaWaterTests
{
    // Mackenzie (1981): check value 1550.744 m/s at 25 °C, 35, 1000 m.
    [Fact]
    public void Mackenzie_has_its_published_check_value() => Assert.Equal(1550.744, SeaWater.Mackenzie(25, 35, 1000), 5e-4);

    // Mackenzie (1981), arithmetic of the nine terms.
    [Theory]
    [InlineData(25, 35, 1000, 1550.7440275)]
    [InlineData(10, 35, 0, 1489.8034)]
    [InlineData(0, 35, 0, 1448.96)]
    [InlineData(20, 35, 5000, 1605.36595)]
    [InlineData(40, 40, 10000, 1718.7736)]
    public void Mackenzie_has_its_digits(double t, double s, double d, double expected) => Assert.Equal(expected, SeaWater.Mackenzie(t, s, d), 1e-9);

    // UNESCO Technical Papers in Marine Science 44 (1983), p. 49: 1731.995 m/s at S = 40, 40 °C, 10000 dbar.
    [Fact]
    public void Chen_millero_has_its_published_check_value() => Assert.Equal(1731.995, SeaWater.ChenMillero(40, 40, 10000), 5e-4);

    // UNESCO Technical Papers in Marine Science 44 (1983), table on p. 50, to 0.1 m/s.
    [Theory]
    [InlineData(0, new[] { 1435.8, 1520.4, 1610.4, 1449.1, 1534.0, 1623.2 })]
    [InlineData(10, new[] { 1477.7, 1561.3, 1647.4, 1489.8, 1573.4, 1659.0 })]
    [InlineData(20, new[] { 1510.3, 1593.6, 1676.8, 1521.5, 1604.5, 1687.2 })]
    [InlineData(30, new[] { 1535.2, 1619.0, 1700.6, 1545.6, 1629.0, 1710.1 })]
    [InlineData(40, new[] { 1553.4, 1638.0, 1719.2, 1563.2, 1647.3, 1727.8 })]
    public void Chen_millero_has_its_published_table(double temperature, double[] row)
    {
        for (int i = 0; i < 6; i++)
            Assert.Equal(row[i], SeaWater.ChenMillero(temperature, i < 3 ? 25 : 35, 5000 * (i % 3)), 0.05);
    }

    // The same equation, arithmetic to more digits.
    [Theory]
    [InlineData(0, 35, 0, 1449.138828130)]
    [InlineData(20, 35, 0, 1521.461973101)]
    [InlineData(40, 25, 10000, 1719.150885360)]
    [InlineData(25, 35, 1000, 1551.143219080)]
    public void Chen_millero_has_its_digits(double t, double s, double p, double expected) => Assert.Equal(expected, SeaWater.ChenMillero(t, s, p), 1e-6);

    // Saunders (1981): 7500.00 dbar at 7321.45 m and 30° of latitude, the check value kept with public implementations.
    [Fact]
    public void Pressure_has_its_published_check_value()
    {
        Assert.Equal(7500.00, SeaWater.PressureAtDepth(7321.45, 30), 0.01);
        Assert.Equal(0, SeaWater.PressureAtDepth(0, 30));
    }

    // T68 = 1.00024 T90: 25 °C (ITS-90) is 25.006 on the scale of the equations, some 0.015 m/s.
    [Fact]
    public void The_service_takes_temperatures_on_todays_scale()
    {
        Assert.Equal(SeaWater.Mackenzie(25.006, 35, 1000), SoundSpeed.SeaWater(25, 35, 1000), 1e-9);
        Assert.Equal(SeaWater.ChenMillero(35.0084, 35, 0), SoundSpeed.SeaWater(35, 35, 0), 1e-9);
    }

    [Fact]
    public void Both_equations_agree_in_the_upper_ocean_where_one_takes_over_from_the_other()
    {
        double worst = 0;
        for (double t = 0; t <= 30; t += 2.5)
        {
            for (double d = 0; d <= 200; d += 20)
            {
                worst = Math.Max(worst, Step(t, 25, d));
                worst = Math.Max(worst, Step(t, 40, d));
                if (t == 30)
                    for (double s = 25; s <= 40; s += 2.5) worst = Math.Max(worst, Step(30, s, d));
            }
        }

        Assert.InRange(worst, 0, 0.45);

        static double Step(double t, double s, double d)
            => Math.Abs(SeaWater.Mackenzie(t, s, d) - SeaWater.ChenMillero(t, s, SeaWater.PressureAtDepth(d, 45)));
    }

    [Fact]
    public void Every_water_in_range_has_a_plausible_speed_that_rises_with_depth()
        => Gen.Select(Gen.Double[0, 40], Gen.Double[0, 42], Gen.Double[0, 9600]).Always(
            6,
            2000,
            (t, s, d) =>
            {
                double speed = SoundSpeed.SeaWater(t, s, d);
                Assert.InRange(speed, 1395, 1760);
                Assert.True(SoundSpeed.SeaWater(t, s, d + 100) > speed - 1);
            });

    [Theory]
    [InlineData(41, 35, 10, "temperature in °C is 41")]
    [InlineData(double.NaN, 35, 10, "temperature in °C is NaN")]
    [InlineData(10, -1, 10, "salinity in PSU is -1; 0 to 42")]
    [InlineData(10, 35, -0.5, "depth in metres is -0.5; 0 to 9700")]
    [InlineData(-1, 10, 10, "0 to 40 is allowed")]
    public void Water_out_of_range_is_refused_with_value_and_range(double t, double s, double d, string message)
        => Assert.Contains(message, Assert.Throws<ArgumentOutOfRangeException>(() => SoundSpeed.SeaWater(t, s, d)).Message, StringComparison.Ordinal);
}
