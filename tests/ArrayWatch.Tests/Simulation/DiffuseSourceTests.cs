using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;
using ArrayWatch.Simulation.Fields;

namespace ArrayWatch.Tests.Simulation;

public sealed class DiffuseSourceTests
{
    // k d = x for a distance of x metres at 1 rad/m.
    private const double UnitFrequency = 1500 / (2 * Math.PI);

    // Abramowitz & Stegun (1964), table 9.1.
    [Theory]
    [InlineData(0.5, 0.938469807240813)]
    [InlineData(1, 0.765197686557966)]
    [InlineData(2, 0.223890779141236)]
    [InlineData(5, -0.177596771314338)]
    [InlineData(10, -0.245935764451348)]
    public void Cylindrical_noise_has_bessel_coherence(double x, double expected)
    {
        ComplexMatrix r = Pair(new CylindricalIsotropicNoise { Spectrum = new(0) }, new Position(0.6 * x, 0.8 * x, 0));
        Assert.Equal(expected, r.Re[2], 1e-12);
        Assert.Equal(0, r.Im[2], 1e-12);
    }

    [Theory]
    [InlineData(0.5)]
    [InlineData(4.7)]
    public void Spherical_noise_has_sinc_coherence_in_every_direction(double x)
    {
        ComplexMatrix r = Pair(new SphericalIsotropicNoise { Spectrum = new(0) }, new Position(0, 0.6 * x, 0.8 * x));
        Assert.Equal(Math.Sin(x) / x, r.Re[2], 1e-12);
    }

    // Horizontal pair 2J1(x)/x, vertical pair with complex coherence, of a dipole surface: direct integration of
    // the model of Cron & Sherman, JASA 34, 1962.
    [Theory]
    [InlineData(0.5, 0.9690738307, 0.9383626495, 0.3250740613)]
    [InlineData(2, 0.5767248078, 0.2012240086, 0.8707955500)]
    [InlineData(5, -0.1310316550, -0.4408767350, -0.1901788162)]
    public void Surface_noise_agrees_with_the_dipole_model(double x, double horizontal, double verticalRe, double verticalIm)
    {
        SurfaceDipoleNoise noise = new() { Spectrum = new(0) };
        Assert.Equal(horizontal, Pair(noise, new Position(x, 0, 0)).Re[2], 1e-9);

        // The upper sensor leads: the sound comes from above.
        ComplexMatrix r = Pair(noise, new Position(0, 0, x));
        Assert.Equal(verticalRe, r.Re[2], 1e-4);
        Assert.Equal(verticalIm, r.Im[2], 1e-4);

        // The general quadrature tends to the horizontal closed form.
        Assert.Equal(horizontal, Pair(noise, new Position(x, 0, 1e-7)).Re[2], 1e-4);
    }

    // Mirabilii & Habets, arXiv 1805.09679, 2018, with their constants: U = 10 m/s, 100 Hz, 2 cm along and 1 cm across.
    [Fact]
    public void Wind_noise_decays_as_published()
    {
        WindNoise wind = new() { Spectrum = new(0), TowardRadians = 0, SpeedMetresPerSecond = 10 };
        ComplexMatrix r = SampledScene.CovarianceOf(wind, 100, 340, new Position(0, 0, 0), new Position(0.02, 0.01, 0));
        Assert.Equal(0.4741989805, r[1, 0].Magnitude, 1e-9);

        // Quarter of a turn at Uc = 8 m/s, and the sensor downwind is late.
        Assert.Equal(-Math.PI / 2, r[1, 0].Phase, 1e-9);
    }

    [Fact]
    public void Wind_noise_follows_each_channels_strength()
    {
        WindNoise wind = new() { Spectrum = new(0), TowardRadians = 0, SpeedMetresPerSecond = 10, ChannelDecibels = [0, 6] };
        ComplexMatrix r = SampledScene.CovarianceOf(wind, 100, 340, new Position(0, 0, 0), new Position(0.02, 0, 0));
        Assert.Equal(Math.Pow(10, 0.6), r.Re[3], 1e-9);
        Assert.Equal(0.8217249580 * Math.Pow(10, 0.3), r[1, 0].Magnitude, 1e-8);
    }

    private static ComplexMatrix Pair(DiffuseSource source, Position separation) =>
        SampledScene.CovarianceOf(source, UnitFrequency, 1500, new Position(0, 0, 0), separation);
}
