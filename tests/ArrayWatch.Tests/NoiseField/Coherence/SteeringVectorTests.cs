using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Signals;

namespace ArrayWatch.Tests.NoiseField.Coherence;

public sealed class SteeringVectorTests
{
    private static readonly ArrayGeometry Line = ArrayGeometry.UniformLine(5, 0.75, new(1, 0, 0));

    // The public convention: x_n ∝ e^{+j2πf u·p_n/c}; a quarter wavelength nearer leads by 90°.
    [Fact]
    public void A_sensor_nearer_the_source_leads()
    {
        double[] re = new double[5], im = new double[5];
        SteeringVector.PlaneWave(Line, new(3, 0, 0), 500, 1500, re, im);
        for (int n = 0; n < 5; n++)
        {
            Assert.Equal(Math.Cos(Math.PI / 2 * n), re[n], 1e-12);
            Assert.Equal(Math.Sin(Math.PI / 2 * n), im[n], 1e-12);
        }
    }

    [Fact]
    public void A_far_point_source_is_a_plane_wave_up_to_a_common_phase()
    {
        double[] re = new double[5], im = new double[5], pre = new double[5], pim = new double[5];
        Position toward = Position.Direction(0.7, 0.3);
        SteeringVector.PlaneWave(Line, toward, 500, 1500, pre, pim);
        SteeringVector.PointSource(Line, 1e6 * toward, 500, 1500, re, im);
        double innerRe = 0, innerIm = 0;
        for (int n = 0; n < 5; n++)
        {
            innerRe += (pre[n] * re[n]) + (pim[n] * im[n]);
            innerIm += (pre[n] * im[n]) - (pim[n] * re[n]);
        }

        Assert.Equal(5, Math.Sqrt((innerRe * innerRe) + (innerIm * innerIm)), 1e-8);
    }

    [Fact]
    public void A_near_source_is_stronger_at_the_nearest_sensor_and_has_a_mean_square_of_one()
    {
        double[] re = new double[5], im = new double[5];
        SteeringVector.PointSource(Line, new(0, 1, 0), 500, 1500, re, im);
        double[] power = [.. re.Zip(im, (a, b) => (a * a) + (b * b))];
        Assert.Equal(5, power.Sum(), 1e-12);
        Assert.Equal(1 + (0.75 * 0.75), power[0] / power[1], 1e-12);
        // Spherical spreading: phase difference is −k(r1 − r0).
        double expected = -2 * Math.PI * 500 / 1500 * (Math.Sqrt(1 + (0.75 * 0.75)) - 1);
        Assert.Equal(expected, Math.Atan2(im[1], re[1]) - Math.Atan2(im[0], re[0]), 1e-12);
    }

    [Fact]
    public void A_source_at_a_channel_or_a_short_span_is_refused()
    {
        double[] re = new double[5], im = new double[5];
        ArgumentOutOfRangeException e = Assert.Throws<ArgumentOutOfRangeException>(
            () => SteeringVector.PointSource(Line, Line[3], 500, 1500, re, im));
        Assert.Contains("channel '4'", e.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => SteeringVector.PlaneWave(Line, new(1, 0, 0), 500, 1500, new double[4], im));
        Assert.Throws<ArgumentOutOfRangeException>(() => SteeringVector.PlaneWave(Line, default, 500, 1500, re, im));
    }
}
