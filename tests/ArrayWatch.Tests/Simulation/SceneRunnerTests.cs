using System.Numerics;
using ArrayWatch.Signals;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;
using ArrayWatch.Simulation.Fields;
using ArrayWatch.Simulation.Levels;
using ArrayWatch.Simulation.Shapes;

namespace ArrayWatch.Tests.Simulation;

public sealed class SceneRunnerTests
{
    [Fact]
    public void Sample_covariance_converges_to_the_stated_model()
    {
        const int Frames = 800;
        Scene scene = SampledScene.Line(8, SampledScene.MixedField);
        Complex[][,] sample = SampledScene.Covariance(scene, Frames, 41);
        for (int f = 0; f < 2; f++)
        {
            double k = 2 * Math.PI * scene.Frequencies[f] / SampledScene.SoundSpeed;
            double wave = Math.Pow(10, 0.3), total = 1 + wave + 0.01;
            for (int l = 0; l < 8; l++)
            {
                for (int m = 0; m < 8; m++)
                {
                    double d = 1.5 * (l - m), kd = k * Math.Abs(d);
                    Complex model = l == m ? total : (Math.Sin(kd) / kd) + Complex.FromPolarCoordinates(wave, k * d * Math.Cos(0.7));

                    // E|ΔS|² = R_ll R_mm / n (Goodman 1963), so |ΔS|² n / (R_ll R_mm) is about exponential: beyond 20 in
                    // any of 72 distinct entries with probability 2e-7 for another start value.
                    double square = (sample[f][l, m] - model).Magnitude;
                    Assert.True(square * square * Frames * 10 / (total * total) < 20, $"bin {f}, {l} {m}: {sample[f][l, m]} is not {model}");
                }
            }
        }
    }

    [Fact]
    public void The_same_start_value_gives_the_same_bytes()
    {
        Scene scene = DemoScenes.FieldMicrophones().Scene;
        SceneRunner a = new(scene, new RandomNumbers(5)), b = new(scene, new RandomNumbers(5)), c = new(scene, new RandomNumbers(6));
        float[] x = new float[a.FrameLength], y = new float[a.FrameLength], z = new float[a.FrameLength];
        for (int i = 0; i < 20; i++)
        {
            a.NextFrame(x);
            b.NextFrame(y);
            c.NextFrame(z);
            Assert.Equal(x, y);
            Assert.NotEqual(x, z);
        }

        Assert.Equal(19UL, a.Sequence);
        Assert.Equal(19 * scene.FrameSeconds, a.TimeSeconds, 1e-9);
    }

    [Fact]
    public void A_sensor_nearer_the_source_leads()
    {
        Scene scene = SampledScene.Line(2, [new PlaneWave { Spectrum = new(20), Toward = new Position(1, 0, 0) }]);
        Complex[,] s = SampledScene.Covariance(scene, 40, 2)[0];
        Assert.Equal(2 * Math.PI * 120 * 1.5 / 1500, s[1, 0].Phase, 0.02);
    }

    [Fact]
    public void A_wrong_sound_speed_and_a_misplaced_sensor_show_in_the_phase()
    {
        Scene scene = SampledScene.Line(2, [new PlaneWave { Spectrum = new(20), Toward = new Position(1, 0, 0) }]) with
        {
            SoundSpeed = 1400, Misplacements = [default, new Position(0.3, 0, 0)],
        };
        Assert.Equal(2 * Math.PI * 120 * 1.8 / 1400, SampledScene.Covariance(scene, 40, 2)[0][1, 0].Phase, 0.02);
    }

    [Fact]
    public void Two_paths_of_one_source_stay_fully_coherent()
    {
        CorrelatedPaths paths = new()
        {
            Spectrum = new(0), Toward = Position.Direction(0.4, 0), ReflectedToward = Position.Direction(1.9, 0.3),
            ReflectionDecibels = -2, ReflectionDelaySeconds = 0.004,
        };
        Complex[,] s = SampledScene.Covariance(SampledScene.Line(6, [paths]) with { SelfNoise = new(-60) }, 20, 3)[1];
        Assert.True(SampledScene.Coherence(s, 0, 5).Magnitude > 0.999);
        double[] levels = [.. Enumerable.Range(0, 6).Select(n => s[n, n].Real)];
        Assert.True(levels.Max() > 2 * levels.Min(), "interference of the paths makes levels uneven");
    }

    [Fact]
    public void A_near_source_curves_its_wave_front()
    {
        NearFieldSource near = new() { Spectrum = new(20), At = new Position(3.75, 10, 0) };
        Complex[,] s = SampledScene.Covariance(SampledScene.Line(6, [near]), 40, 4)[1];
        double expected = -2 * Math.PI * 260 / 1500 * (Math.Sqrt((3.75 * 3.75) + 100) - Math.Sqrt((0.75 * 0.75) + 100));
        Assert.Equal(expected, s[0, 2].Phase, 0.02);
    }

    [Fact]
    public void A_passing_ship_swings_through_its_closest_bearing()
    {
        MovingShip ship = new()
        {
            Spectrum = new(10), ClosestSeconds = 100, ClosestRangeMetres = 500, ClosestBearingRadians = 1, SpeedMetresPerSecond = 5,
        };
        Assert.Equal(1, ship.BearingAt(100), 1e-12);
        Assert.Equal(1 + (Math.PI / 4), ship.BearingAt(200), 1e-12);
    }

    [Fact]
    public void Levels_follow_their_curves()
    {
        PlaneWave wave = new() { Spectrum = new(0), Toward = new Position(0, 1, 0), Level = new Ramp(100, 200, 12) };
        Scene scene = SampledScene.Line(2, [wave]) with { SelfNoise = new(-60) };
        double before = SampledScene.Covariance(scene, 20, 5)[0][0, 0].Real;
        double after = SampledScene.Covariance(scene, 20, 5, skipSeconds: 300)[0][0, 0].Real;

        // Two means of 200 exponentials each: 0.43 dB deviation of the difference; six of them.
        Assert.Equal(12, 10 * Math.Log10(after / before), 2.6);
        Assert.Equal(3, new Swing(40, 6).DecibelsAt(10), 1e-12);
        Assert.Equal(new Gusts(2, 10, 9).DecibelsAt(19.999), new Gusts(2, 10, 9).DecibelsAt(20.001), 0.01);
    }

    [Fact]
    public void Shots_are_rare_and_loud()
    {
        Transients shots = new() { Spectrum = new(30), SlotSeconds = 100, DurationSeconds = 0.5, StartValue = 12 };
        Scene scene = SampledScene.Line(2, [new SphericalIsotropicNoise { Spectrum = new(0) }, shots]);
        SceneRunner runner = new(scene, new RandomNumbers(8));
        float[] data = new float[runner.FrameLength];
        int loud = 0, snapshots = 0;
        while (runner.TimeSeconds < 1994)
        {
            runner.NextFrame(data);
            for (int k = 0; k < scene.SnapshotsPerFrame; k++, snapshots++)
            {
                double power = 0;
                foreach (float v in data.AsSpan(8 * k, 8)) power += v * v / 4;
                if (power > 40) loud++;
            }
        }

        // Twenty shots of one snapshot each; power below 40 of 1000 happens to one shot with probability under 1e-4.
        Assert.InRange(loud, 18, 22);
    }

    [Fact]
    public void A_bow_moves_the_middle_of_a_line_and_not_its_ends()
    {
        ArrayGeometry line = ArrayGeometry.UniformLine(5, 2, new Position(1, 0, 0));
        LineBow bow = new(0.5, new Position(0, 1, 0), 100);
        Assert.Equal(0, bow.DisplacementAt(line, 0, 0).Y, 1e-12);
        Assert.Equal(0.5, bow.DisplacementAt(line, 2, 0).Y, 1e-12);
        Assert.Equal(-0.5, bow.DisplacementAt(line, 2, 50).Y, 1e-12);
        Assert.Equal(0.5, new LineSnake(0.5, new Position(0, 1, 0), 1).DisplacementAt(line, 1, 7).Y, 1e-12);
    }

    [Fact]
    public void Healthy_spreads_are_as_wide_as_stated()
    {
        ChannelResponse[] responses = ChannelResponse.Spread(2000, 0.5, 3, 2, new RandomNumbers(14));

        // Deviation of a deviation over 2000 draws is 1.6 %: 10 % is beyond six of them.
        Assert.Equal(0.5, Math.Sqrt(responses.Average(r => r.GainDecibels * r.GainDecibels)), 0.05);
        Assert.Equal(3, Math.Sqrt(responses.Average(r => r.PhaseDegrees * r.PhaseDegrees)), 0.3);
        Assert.Equal(2, Math.Sqrt(responses.Average(r => r.SelfNoiseDecibels * r.SelfNoiseDecibels)), 0.2);
    }

    [Fact]
    public void A_scene_that_cannot_be_run_is_refused_with_its_reason()
    {
        Scene scene = SampledScene.Line(4, SampledScene.MixedField);
        Assert.Contains("120 Hz", Refusal(scene with { Frequencies = [260, 120] }), StringComparison.Ordinal);
        Assert.Contains("channel 4 of 4", Refusal(scene with { Faults = [new PolarityFault { Channels = [4] }] }), StringComparison.Ordinal);
        Assert.Contains("sound speed", Refusal(scene with { SoundSpeed = 0 }), StringComparison.Ordinal);
        Assert.Contains("3 responses", Refusal(scene with { Responses = new ChannelResponse[3] }), StringComparison.Ordinal);

        static string Refusal(Scene scene) => Assert.Throws<ArgumentException>(() => new SceneRunner(scene, new RandomNumbers(1))).Message;
    }
}
