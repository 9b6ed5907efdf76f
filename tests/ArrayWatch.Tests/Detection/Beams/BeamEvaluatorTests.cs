using System.Numerics;
using ArrayWatch.Detection;
using ArrayWatch.Detection.Beams;
using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Signals;
using ArrayWatch.Signals.LinearAlgebra;
using ArrayWatch.Tests.Signals.Statistics;
using CsCheck;

namespace ArrayWatch.Tests.Detection.Beams;

public sealed class BeamEvaluatorTests
{
    private const double Speed = 1500;
    private static readonly LookDirection Broadside = new("broadside", 90, 0);
    private static readonly LookDirection Endfire = new("endfire", 0, 0);

    // Delay-and-sum on a uniform line in isotropic noise (Van Trees, Optimum Array Processing, 2002, section 2.6): N at half-wavelength
    // spacing whatever the direction, else N/(1 + (2/N)Σ(N−n) sinc(nkd)) broadside.
    [Theory]
    [InlineData(8, 1, 90, 9.03089987)]
    [InlineData(16, 1, 37, 12.04119983)]
    [InlineData(32, 1, 0, 15.05149978)]
    [InlineData(8, 0.5, 90, 6.19430860)]
    [InlineData(8, 0.5, 0, 9.03089987)]
    [InlineData(8, 0.25, 90, 3.42907067)]
    [InlineData(8, 0.25, 0, 6.19430860)]
    [InlineData(32, 0.5, 90, 12.08457379)]
    public void The_conventional_beam_has_its_known_gain_in_isotropic_noise(int n, double kdOverPi, double azimuth, double expected)
    {
        BeamAssessment beam = Healthy(n, kdOverPi, new("look", azimuth, 0), whiteNoise: 0);
        Assert.Equal(expected, beam.Conventional.HealthyDecibels, 1e-7);
    }

    // MVDR gain vᴴQ⁻¹v (Capon 1969; Van Trees 2002, section 6.2), Q = (sinc + εI)/(1 + ε), N = 8.
    [Theory]
    [InlineData(0.5, 90, 0.01, 6.72318363, 6.214980)]
    [InlineData(0.5, 0, 0.01, 13.23185340, 9.030900)]
    [InlineData(0.25, 0, 0.01, 11.18897325, 6.214980)]
    [InlineData(0.5, 0, 0.1, 11.25463723, 9.030900)]
    public void The_adaptive_beam_has_its_known_gain_in_isotropic_noise(
        double kdOverPi, double azimuth, double whiteNoise, double adaptive, double conventional)
    {
        BeamAssessment beam = Healthy(8, kdOverPi, new("look", azimuth, 0), whiteNoise);
        Assert.Equal(adaptive, beam.Adaptive.HealthyDecibels, 1e-7);
        Assert.Equal(conventional, beam.Conventional.HealthyDecibels, 0.04);
    }

    // Matrix inversion lemma: one interferer of INR 100 at 20° from broadside of a half-wavelength line of 8.
    [Fact]
    public void The_adaptive_beam_nulls_an_interferer()
    {
        ArrayGeometry line = Line(8, 1);
        double[] re = new double[8], im = new double[8];
        SteeringVector.PlaneWave(line, Position.Direction(70 * Math.PI / 180, 0), 750, Speed, re, im);
        void Model(int bin, ComplexMatrix r)
        {
            for (int i = 0; i < 8; i++)
                for (int k = 0; k < 8; k++)
                    r[i, k] = (i == k ? 1 : 0) + (100 * new Complex(re[i], im[i]) * new Complex(re[k], -im[k]));
        }

        BeamAssessment beam = new BeamEvaluator(line, [Broadside], 0).Assess([750], Speed, Model, AllHealthy(8), [])[0];
        Assert.Equal(28.85170444, beam.Adaptive.HealthyDecibels, 1e-7);
    }

    // Cox (1973): a mismatched steering vector with a noise-only covariance loses c² = 0.9843162361 at 1° on a half-wavelength line of 8.
    // The mismatch is put into the channels' phases here.
    [Fact]
    public void A_mismatch_costs_what_cox_says()
    {
        ArrayGeometry line = Line(8, 1);
        ChannelResponse[] channels = [.. Enumerable.Range(0, 8).Select(i =>
        {
            double phase = Math.PI * i * Math.Sin(Math.PI / 180);
            return new ChannelResponse(i, [Math.Cos(phase)], [Math.Sin(phase)], [0]);
        })];
        BeamAssessment beam = Evaluate(line, White, channels, []);
        Assert.Equal(10 * Math.Log10(0.9843162361), beam.Adaptive.FoundDecibels - beam.Adaptive.HealthyDecibels, 1e-8);
        Assert.Equal(10 * Math.Log10(0.9843162361), beam.Conventional.FoundDecibels - beam.Conventional.HealthyDecibels, 1e-8);
    }

    // K of N silent, white noise: 10 log (N−K)/N; where the dead still deliver the noise of one, 20 log (N−K)/N. Left out, the latter
    // returns to the former.
    [Theory]
    [InlineData(32, 1, -0.13788284, -0.27576569)]
    [InlineData(32, 4, -0.57991947, -1.15983894)]
    [InlineData(64, 3, -0.20850139, -0.41700278)]
    public void Missing_elements_cost_what_they_should(int n, int dead, double silent, double noisy)
    {
        ArrayGeometry line = Line(n, 1);
        ChannelResponse[] Channels(double noise) => [.. Enumerable.Range(0, n).Select(
            i => i < dead ? ChannelResponse.Dead(i, [noise]) : ChannelResponse.Healthy(i, 1))];
        BeamGains quiet = Evaluate(line, White, Channels(0), []).Conventional;
        Assert.Equal(silent, quiet.FoundDecibels - quiet.HealthyDecibels, 1e-8);
        ChannelCorrection[] leftOut = [.. Enumerable.Range(0, dead).Select(i => new ChannelCorrection(i, false, i, [1], [0], [0]))];
        BeamGains loud = Evaluate(line, White, Channels(1), leftOut).Conventional;
        Assert.Equal(noisy, loud.FoundDecibels - loud.HealthyDecibels, 1e-8);
        Assert.Equal(silent, loud.CorrectedDecibels - loud.HealthyDecibels, 1e-8);
    }

    // Random phases of deviation σ: E|B|² = e^(−σ²) + (1 − e^(−σ²))/N (phased-array form of Ruze, Proc. IEEE 54, 633–640, 1966). One draw
    // deviates by at most 0.053, so the mean of 1000 by 0.0017; the start value is fixed, and with another one a failure has probability 3e-5.
    [Theory]
    [InlineData(10, 0.9709351184)]
    [InlineData(30, 0.7677070390)]
    public void Random_phase_errors_cost_what_ruze_says(double sigmaDegrees, double expected)
    {
        const int N = 32, Draws = 1000;
        BeamEvaluator evaluator = new(Line(N, 1), [Broadside], 0);
        Random random = new(20260501);
        double sum = 0;
        for (int draw = 0; draw < Draws; draw++)
        {
            ChannelResponse[] channels = [.. Enumerable.Range(0, N).Select(i =>
            {
                double normal = Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
                double phase = sigmaDegrees * Math.PI / 180 * normal;
                return new ChannelResponse(i, [Math.Cos(phase)], [Math.Sin(phase)], [0]);
            })];
            BeamGains gains = evaluator.Assess([750], Speed, White, channels, [])[0].Conventional;
            sum += Math.Pow(10, (gains.FoundDecibels - gains.HealthyDecibels) / 10);
        }

        Assert.Equal(expected, sum / Draws, 0.007);
    }

    // Whatever known gains, phases and exchanges do, the matching correction takes back.
    [Fact]
    public void A_right_correction_restores_the_healthy_gain()
        => Gen.Double[0.2, 5].Array[6].Select(Gen.Double[-3, 3].Array[6], Gen.Shuffle(Enumerable.Range(0, 6).ToArray())).Always(
            11,
            100,
            (double[] gains, double[] phases, int[] order) =>
            {
                ArrayGeometry line = Line(6, 0.7);
                Complex[] g = [.. gains.Zip(phases, Complex.FromPolarCoordinates)];
                ChannelResponse[] channels = [.. Enumerable.Range(0, 6).Select(i => new ChannelResponse(order[i], [g[i].Real], [g[i].Imaginary], [0]))];
                ChannelCorrection[] corrections = [.. Enumerable.Range(0, 6).Select(
                    i => new ChannelCorrection(i, true, order[i], [(1 / g[i]).Real], [(1 / g[i]).Imaginary], [0]))];
                foreach (LookDirection look in new[] { Broadside, Endfire })
                {
                    BeamAssessment beam = new BeamEvaluator(line, [look]).Assess([750], Speed, Isotropic(line, 0.02), channels, corrections)[0];
                    Assert.Equal(beam.Conventional.HealthyDecibels, beam.Conventional.CorrectedDecibels, 1e-8);
                    Assert.Equal(beam.Adaptive.HealthyDecibels, beam.Adaptive.CorrectedDecibels, 1e-8);
                }
            });

    // The unloaded adaptive beam has the greatest gain of all weights (Cauchy–Schwarz), so it beats the conventional one when both are healthy.
    [Fact]
    public void The_adaptive_beam_is_never_worse_when_all_is_right()
        => Gen.Select(Gen.Double[0.1, 1.4], Gen.Double[0, 180], Gen.Double[0.001, 1]).Always(
            12,
            200,
            (kd, azimuth, white) =>
            {
                BeamAssessment beam = Healthy(7, kd, new("look", azimuth, 5), white);
                Assert.True(beam.Adaptive.HealthyDecibels >= beam.Conventional.HealthyDecibels - 1e-9);
                Assert.Equal(beam.Adaptive.HealthyDecibels, beam.Adaptive.FoundDecibels, 1e-9);
                Assert.Equal(beam.Adaptive.HealthyDecibels, beam.Adaptive.CorrectedDecibels, 1e-9);
            });

    [Fact]
    public void A_reversed_channel_costs_and_the_correction_or_leaving_it_out_mends()
    {
        ArrayGeometry line = Line(8, 1);
        ChannelResponse[] channels = [.. Enumerable.Range(0, 8).Select(
            i => i == 3 ? new ChannelResponse(3, [-1], [0], [0]) : ChannelResponse.Healthy(i, 1))];
        BeamGains gains = Evaluate(line, White, channels, [new ChannelCorrection(3, true, 3, [-1], [0], [0])]).Conventional;
        Assert.Equal(20 * Math.Log10(6.0 / 8), gains.FoundDecibels - gains.HealthyDecibels, 1e-10);
        Assert.Equal(gains.HealthyDecibels, gains.CorrectedDecibels, 1e-10);
        gains = Evaluate(line, White, channels, [new ChannelCorrection(3, false, 3, [0], [0], [0])]).Conventional;
        Assert.Equal(10 * Math.Log10(7.0 / 8), gains.CorrectedDecibels - gains.HealthyDecibels, 1e-10);
    }

    [Fact]
    public void Decibels_are_averaged_over_the_bins()
    {
        ArrayGeometry line = Line(8, 1);
        BeamEvaluator evaluator = new(line, [Broadside, Endfire], 0);
        IReadOnlyList<BeamAssessment> both = evaluator.Assess([375, 750], Speed, (f, r) => Isotropic(line, 0, f == 0 ? 375 : 750)(f, r), AllHealthy(8, 2), []);
        Assert.Equal((6.19430860 + 9.03089987) / 2, both[0].Conventional.HealthyDecibels, 1e-7);
        Assert.Equal("endfire", both[1].Look.Name);
    }

    [Fact]
    public void A_silent_array_has_the_least_gain_and_never_a_number_that_is_none()
    {
        ArrayGeometry line = Line(4, 1);
        ChannelResponse[] dead = [.. Enumerable.Range(0, 4).Select(i => ChannelResponse.Dead(i, [0]))];
        ChannelCorrection[] none = [.. Enumerable.Range(0, 4).Select(i => new ChannelCorrection(i, false, i, [0], [0], [0]))];
        BeamAssessment beam = Evaluate(line, White, dead, none);
        foreach (BeamGains gains in new[] { beam.Conventional, beam.Adaptive })
        {
            Assert.Equal(BeamEvaluator.LeastDecibels, gains.FoundDecibels);
            Assert.Equal(BeamEvaluator.LeastDecibels, gains.CorrectedDecibels);
        }

        dead[0] = new ChannelResponse(0, [double.NaN], [0], [0]);
        Assert.Equal(BeamEvaluator.LeastDecibels, Evaluate(line, White, dead, none).Adaptive.FoundDecibels);
    }

    [Fact]
    public void What_does_not_fit_is_refused()
    {
        ArrayGeometry line = Line(4, 1);
        BeamEvaluator evaluator = new(line, [Broadside]);
        Assert.Throws<ArgumentException>(() => evaluator.Assess([750], Speed, White, AllHealthy(3), []));
        Assert.Throws<ArgumentException>(() => evaluator.Assess([750], Speed, White, AllHealthy(4, 2), []));
        Assert.Throws<ArgumentException>(() => evaluator.Assess([], Speed, White, AllHealthy(4), []));
        Assert.Throws<ArgumentException>(() => evaluator.Assess([750], Speed, (_, r) => r.Clear(), AllHealthy(4), []));
        ArgumentException e = Assert.Throws<ArgumentException>(
            () => evaluator.Assess([750], Speed, White, AllHealthy(4), [new ChannelCorrection(1, true, 9, [1], [0], [0])]));
        Assert.Contains("carries 9; 0 to 3", e.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => new BeamEvaluator(line, [], -1));
    }

    private static ArrayGeometry Line(int n, double kdOverPi) => ArrayGeometry.UniformLine(n, kdOverPi, new(1, 0, 0));

    private static ChannelResponse[] AllHealthy(int n, int bins = 1) => [.. Enumerable.Range(0, n).Select(i => ChannelResponse.Healthy(i, bins))];

    private static void White(int bin, ComplexMatrix r)
    {
        r.Clear();
        for (int i = 0; i < r.Rows; i++) r[i, i] = 1;
    }

    /// <summary>Isotropic noise at 750 Hz, where one metre is half a wavelength, with white noise beside it.</summary>
    private static Action<int, ComplexMatrix> Isotropic(ArrayGeometry line, double whiteNoise, double frequency = 750) => (_, r) =>
    {
        CoherenceMatrix.Fill(line, d => IsotropicNoise.Spherical(d, frequency, Speed), r);
        for (int i = 0; i < line.Count; i++) r[i, i] += whiteNoise;
    };

    private static BeamAssessment Healthy(int n, double kdOverPi, LookDirection look, double whiteNoise)
    {
        ArrayGeometry line = Line(n, kdOverPi);
        return new BeamEvaluator(line, [look], 0).Assess([750], Speed, Isotropic(line, whiteNoise), AllHealthy(n), [])[0];
    }

    private static BeamAssessment Evaluate(
        ArrayGeometry line, Action<int, ComplexMatrix> model, ChannelResponse[] channels, ChannelCorrection[] corrections)
        => new BeamEvaluator(line, [Broadside], 0).Assess([750], Speed, model, channels, corrections)[0];
}
