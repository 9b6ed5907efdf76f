using System.Numerics;
using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Signals;
using ArrayWatch.Tests.Signals.Statistics;
using CsCheck;

namespace ArrayWatch.Tests.NoiseField.Coherence;

public sealed class CoherenceTests
{
    private const double Speed = 1500;
    private static readonly Position Up = new(0, 0, 1);

    // Cook, Waterhouse, Berendt, Edelman and Thompson (1955): R = sin(kr)/(kr); values recomputed by a
    // direction integral.
    [Theory]
    [InlineData(0.5, 0.958851077208)]
    [InlineData(1, 0.841470984808)]
    [InlineData(Math.PI / 2, 0.636619772368)]
    [InlineData(2, 0.454648713413)]
    [InlineData(Math.PI, 0)]
    [InlineData(3 * Math.PI / 2, -0.212206590789)]
    [InlineData(5, -0.191784854933)]
    public void Spherical_noise_follows_the_sinc(double x, double expected)
    {
        double frequency = x * Speed / (2 * Math.PI);
        Assert.Equal(expected, IsotropicNoise.Spherical((1.0 / 3) * new Position(2, -1, 2), frequency, Speed), 1e-12);
    }

    // Jacobi–Anger expansion; Abramowitz and Stegun (1964), Table 9.1.
    [Fact]
    public void Cylindrical_noise_sees_only_what_is_square_to_its_axis()
    {
        double frequency = 5 * Speed / (2 * Math.PI);
        Assert.Equal(-0.177596771314338, IsotropicNoise.Cylindrical(new(0.6, 0.8, 40), Up, frequency, Speed), 1e-12);
        Assert.Equal(1, IsotropicNoise.Cylindrical(new(0, 0, 40), Up, frequency, Speed), 1e-12);
    }

    // Cron and Sherman (1962), closed forms; values recomputed by a direction integral, and for m = 1 by a
    // plane of dipoles with exact path lengths.
    [Theory]
    [InlineData(0.5, 0.9690738307, 0.9793287507, 0.9383626495, 0.3250740613, 0.9179601017)]
    [InlineData(1, 0.8801011715, 0.9192278795, 0.7635465814, 0.6023373579, 0.6869526334)]
    [InlineData(Math.PI / 2, 0.7217028449, 0.8096020679, 0.4626700756, 0.8105694691, 0.2963216641)]
    [InlineData(2, 0.5767248078, 0.7056680572, 0.2012240086, 0.8707955500, -0.0335176816)]
    [InlineData(Math.PI, 0.1811917550, 0.3934779251, -0.4052847346, 0.6366197724, -0.7230870555)]
    [InlineData(5, -0.1310316550, 0.0149008372, -0.4408767350, -0.1901788162, -0.4193607379)]
    [InlineData(2 * Math.PI, -0.0676034590, -0.0583367592, 0, -0.3183098862, 0.3039635509)]
    public void Surface_noise_follows_cron_and_sherman(double x, double h1, double h2, double v1Re, double v1Im, double v2Re)
    {
        Assert.Equal(h1, SurfaceNoise.Coherence(0, x).Real, 1e-9);
        Assert.Equal(h2, SurfaceNoise.Coherence(0, x, order: 2).Real, 1e-9);
        Complex vertical = SurfaceNoise.Coherence(x, 0);
        Assert.Equal(v1Re, vertical.Real, 1e-9);
        Assert.Equal(v1Im, vertical.Imaginary, 1e-9);
        Assert.Equal(v2Re, SurfaceNoise.Coherence(x, 0, order: 2).Real, 1e-9);
    }

    // A plane of vertical dipoles, summed over rings with exact path lengths, is the model itself, written another
    // way: p ∝ (cos α / r) e^(−jkr). A wide plane is needed, hence the loose tolerance.
    [Fact]
    public void Surface_noise_at_a_slant_agrees_with_a_plane_of_dipoles()
    {
        const double Depth = 400, K = 2;
        Position first = new(0.7, 0, -Depth), second = new(0, 0.3, -Depth - 0.9);
        Complex cross = 0;
        double powerFirst = 0, powerSecond = 0;
        const int Rings = 6000, Spokes = 48;
        for (int i = 0; i < Rings; i++)
        {
            double angle = Math.PI / 2 * (i + 0.5) / Rings, radius = Depth * Math.Tan(angle);
            double area = radius * Depth / (Math.Cos(angle) * Math.Cos(angle));
            for (int j = 0; j < Spokes; j++)
            {
                double azimuth = 2 * Math.PI * (j + 0.5) / Spokes;
                Position source = new(radius * Math.Cos(azimuth), radius * Math.Sin(azimuth), 0);
                double r1 = source.DistanceTo(first), r2 = source.DistanceTo(second);
                Complex p1 = Complex.FromPolarCoordinates(-first.Z / (r1 * r1), -K * r1);
                Complex p2 = Complex.FromPolarCoordinates(-second.Z / (r2 * r2), -K * r2);
                cross += area * p1 * Complex.Conjugate(p2);
                powerFirst += area * p1.Magnitude * p1.Magnitude;
                powerSecond += area * p2.Magnitude * p2.Magnitude;
            }
        }

        Complex expected = cross / Math.Sqrt(powerFirst * powerSecond);
        Complex actual = SurfaceNoise.Coherence(first - second, Up, K * Speed / (2 * Math.PI), Speed);
        Assert.Equal(expected.Real, actual.Real, 3e-3);
        Assert.Equal(expected.Imaginary, actual.Imaginary, 3e-3);
    }

    // A two-dimensional quadrature over direction, by SciPy.
    [Fact]
    public void Surface_noise_at_a_slant_agrees_with_a_sum_over_directions()
    {
        foreach ((double[] a, double value) in ReferenceValues.Of("surface_re"))
            Assert.Equal(value, SurfaceNoise.Coherence(a[0], a[1], (int)a[2]).Real, 1e-12);
        foreach ((double[] a, double value) in ReferenceValues.Of("surface_im"))
            Assert.Equal(value, SurfaceNoise.Coherence(a[0], a[1], (int)a[2]).Imaginary, 1e-12);
    }

    [Fact]
    public void Every_coherence_is_a_coherence()
        => Gen.Select(Gen.Double[-60, 60], Gen.Double[-60, 60], Gen.Double[0, 50]).Always(
            31,
            500,
            (v, h, kappa) =>
            {
                Position separation = new(h, 0.3 * h, v);
                Complex[] values =
                [
                    SurfaceNoise.Coherence(v, h, 1 + (int)(kappa / 7)),
                    DirectionalNoise.Spherical(separation, new(1, v, 0.2), kappa, 300, Speed),
                    DirectionalNoise.Cylindrical(separation, new(1, v, 0.2), Up, kappa, 300, Speed),
                    TurbulentNoise.Wind(separation, new(v, 1, 0), 20, 8),
                ];
                Complex[] mirrored =
                [
                    SurfaceNoise.Coherence(-v, -h, 1 + (int)(kappa / 7)),
                    DirectionalNoise.Spherical(-1 * separation, new(1, v, 0.2), kappa, 300, Speed),
                    DirectionalNoise.Cylindrical(-1 * separation, new(1, v, 0.2), Up, kappa, 300, Speed),
                    TurbulentNoise.Wind(-1 * separation, new(v, 1, 0), 20, 8),
                ];
                for (int i = 0; i < values.Length; i++)
                {
                    // |Γ| ≤ 1 and Γ(−d) = Γ(d)*, as for any homogeneous field.
                    Assert.InRange(values[i].Magnitude, 0, 1 + 1e-12);
                    Assert.InRange((values[i] - Complex.Conjugate(mirrored[i])).Magnitude, 0, 1e-12);
                }
            });

    [Fact]
    public void Surface_noise_keeps_its_accuracy_over_hundreds_of_wavelengths()
    {
        foreach (double x in new[] { 40.0, 333, 2500 })
        {
            Complex vertical = SurfaceNoise.Coherence(x, 0);
            Assert.Equal(2 * ((Math.Sin(x) / x) + ((Math.Cos(x) - 1) / (x * x))), vertical.Real, 1e-12);
            Assert.Equal(2 * ((Math.Sin(x) / (x * x)) - (Math.Cos(x) / x)), vertical.Imaginary, 1e-12);
            Assert.Equal(8 * Bessel2(x) / (x * x), SurfaceNoise.Coherence(0, x, order: 2).Real, 1e-12);
        }

        static double Bessel2(double x) => (2 * Bessel.J1(x) / x) - Bessel.J0(x);
    }

    // Von Mises laws: circle and sphere quadrature to 1e-13.
    [Theory]
    [InlineData(2, 3, 0.5, 0.046623393004, 0.816107803590)]
    [InlineData(1, 0, 0, 0.765197686558, 0)]
    [InlineData(Math.PI, 5, Math.PI / 2, 0.377325497530, 0)]
    [InlineData(Math.PI / 2, 10, 0, 0.079442783684, 0.990388128004)]
    public void A_cylindrical_von_mises_field_has_the_tabulated_coherence(double x, double kappa, double mu, double re, double im)
    {
        Position separation = new(1, 0, 7), toward = new(Math.Cos(mu), Math.Sin(mu), 0);
        Complex value = DirectionalNoise.Cylindrical(separation, toward, Up, kappa, x * Speed / (2 * Math.PI), Speed);
        Assert.Equal(re, value.Real, 1e-11);
        Assert.Equal(im, value.Imaginary, 1e-11);
    }

    [Theory]
    [InlineData(2, 3, 0.5, 0.241565963841, 0.750110394867)]
    [InlineData(Math.PI, 5, Math.PI / 2, 0.423370800345, 0)]
    [InlineData(2, 0, 0.3, 0.454648713413, 0)]
    public void A_spherical_von_mises_field_has_the_tabulated_coherence(double x, double kappa, double mu, double re, double im)
    {
        Position separation = new(0, 1, 0), toward = new(Math.Sin(mu), Math.Cos(mu), 0);
        Complex value = DirectionalNoise.Spherical(separation, toward, kappa, x * Speed / (2 * Math.PI), Speed);
        Assert.Equal(re, value.Real, 1e-11);
        Assert.Equal(im, value.Imaginary, 1e-11);
    }

    [Fact]
    public void A_very_narrow_directional_field_is_a_plane_wave()
    {
        Position separation = new(1, 2, 0.5), toward = new(0.3, -0.4, 1);
        double phase = 2 * Math.PI * 200 / Speed * separation.Dot(toward) / toward.Length;
        Complex value = DirectionalNoise.Spherical(separation, toward, 1e6, 200, Speed);
        Assert.Equal(Math.Cos(phase), value.Real, 1e-5);
        Assert.Equal(Math.Sin(phase), value.Imaginary, 1e-5);
    }

    // Corcos (1963), arithmetic of the form: |Γ| = 0.6617317382, phase 0.8975979010 rad; downstream lags.
    [Fact]
    public void Corcos_decays_and_lags_downstream()
    {
        Complex value = TurbulentNoise.Corcos(new(0.01, 0.005, 0), new(2, 0, 0), 100, 7, 0.11, 0.7);
        Assert.Equal(0.6617317382, value.Magnitude, 1e-9);
        Assert.Equal(-0.8975979010, value.Phase, 1e-9);
    }

    // Constants of Mirabilii and Habets (2018) at U = 10 m/s; arithmetic of the form.
    [Theory]
    [InlineData(100, 0.02, 0, 0.8217249580)]
    [InlineData(100, 0, 0.02, 0.3330184355)]
    [InlineData(100, 0.02, 0.01, 0.4741989805)]
    [InlineData(20, 0.1, 0, 0.8217249580)]
    public void Wind_decays_with_separation_times_frequency(double frequency, double along, double across, double expected)
        => Assert.Equal(expected, TurbulentNoise.Wind(new(along, 0, across), new(1, 0, 0), frequency, 10).Magnitude, 1e-9);

    [Fact]
    public void Arguments_out_of_range_are_refused_with_value_and_range()
    {
        ArgumentOutOfRangeException e = Assert.Throws<ArgumentOutOfRangeException>(() => IsotropicNoise.Spherical(Up, double.NaN, 1500));
        Assert.Contains("frequency in hertz is NaN", e.Message, StringComparison.Ordinal);
        e = Assert.Throws<ArgumentOutOfRangeException>(() => IsotropicNoise.Spherical(Up, 10, -3));
        Assert.Contains("sound speed in m/s is -3", e.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => IsotropicNoise.Cylindrical(Up, default, 10, 1500));
        Assert.Throws<ArgumentOutOfRangeException>(() => SurfaceNoise.Coherence(0, 1, order: 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => SurfaceNoise.Coherence(1e6, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => DirectionalNoise.Spherical(Up, Up, -1, 10, 1500));
        Assert.Throws<ArgumentOutOfRangeException>(() => TurbulentNoise.Wind(Up, Up, 10, 0));
    }
}
