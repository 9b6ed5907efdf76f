using System.Numerics;
using ArrayWatch.Signals;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;
using ArrayWatch.Simulation.Fields;

namespace ArrayWatch.Tests.Simulation;

/// <summary>
/// What each fault changes and what it leaves alone. Averages are over 4000 snapshots, so a level has a deviation
/// of 0.07 dB and a coherence one of under 0.016; bounds are six of them or more (false failure under 1e-6 for
/// another start value).
/// </summary>
public sealed class FaultTests
{
    private const int Frames = 400;
    private const double Decibel = 0.45;
    private const double Part = 0.1;

    private static readonly Complex[][,] Healthy = Sample();

    [Fact]
    public void A_dead_channel_falls_to_its_level_and_loses_coherence()
    {
        Complex[,] s = Sample(new DeadFault { Channels = [3], RemainingDecibels = -25 })[0];
        Assert.Equal(-25 + (10 * Math.Log10(1 + Math.Pow(10, 0.3))), Level(s, 3), Decibel);
        Assert.True(SampledScene.Coherence(s, 3, 2).Magnitude < Part);
        AssertOthersKept(s, 3);
    }

    [Fact]
    public void A_channel_without_signal_can_give_exact_zeros() =>
        Assert.Equal(0, Sample(new DeadFault { Channels = [3] })[1][3, 3].Real);

    [Fact]
    public void Gain_changes_power_and_keeps_coherence_and_phase()
    {
        Complex[,] s = Sample(new GainFault { Channels = [3], GainDecibels = 6 })[0];
        Assert.Equal(6, Level(s, 3) - Level(Healthy[0], 3), 2 * Decibel);
        AssertCoherence(s, Healthy[0], 3, 2, 0);
    }

    [Fact]
    public void A_rolloff_grows_with_frequency()
    {
        RollOffFault fault = new() { Channels = [3], CornerHertz = 150, Order = 2 };
        Complex[][,] s = Sample(fault);
        for (int f = 0; f < 2; f++)
        {
            double expected = 20 * Math.Log10(fault.ResponseAt(f == 0 ? 120 : 260).Magnitude);
            Assert.Equal(expected, Level(s[f], 3) - Level(Healthy[f], 3), 0.4 + (2 * Decibel));
        }

        Assert.Equal(1 / Math.Sqrt(2), new RollOffFault { Channels = [0], CornerHertz = 80, LosesLowFrequencies = true }.ResponseAt(80).Magnitude, 1e-12);
        Assert.Equal(0, (fault with { TurnsPhase = false }).ResponseAt(200).Imaginary);
    }

    [Fact]
    public void Excess_noise_raises_power_and_lowers_coherence_but_keeps_phase()
    {
        Complex[,] s = Sample(new ExcessNoiseFault { Channels = [3], ExcessDecibels = 9 })[0];
        Assert.Equal(9, Level(s, 3) - Level(Healthy[0], 3), 2 * Decibel);
        double expected = SampledScene.Coherence(Healthy[0], 3, 2).Magnitude * Math.Pow(10, -9.0 / 20);
        Assert.Equal(expected, SampledScene.Coherence(s, 3, 2).Magnitude, Part);
        Assert.Equal(Healthy[0][3, 2].Phase, s[3, 2].Phase, 0.35);
    }

    [Theory]
    [InlineData(45.0)]
    [InlineData(-30.0)]
    public void Phase_turns_one_row_by_a_constant(double degrees)
    {
        Complex[][,] s = Sample(new PhaseFault { Channels = [3], PhaseDegrees = degrees });
        for (int f = 0; f < 2; f++) AssertCoherence(s[f], Healthy[f], 3, 2, degrees * Math.PI / 180);
    }

    [Fact]
    public void Polarity_turns_one_row_by_half_a_turn()
    {
        Complex[][,] s = Sample(new PolarityFault { Channels = [3] });
        for (int f = 0; f < 2; f++) AssertCoherence(s[f], Healthy[f], 3, 2, Math.PI);
    }

    [Fact]
    public void A_late_channel_turns_backwards_in_proportion_to_frequency()
    {
        Complex[][,] s = Sample(new DelayFault { Channels = [3], DelayMicroseconds = 400 });
        AssertCoherence(s[0], Healthy[0], 3, 2, -2 * Math.PI * 120 * 400e-6);
        AssertCoherence(s[1], Healthy[1], 3, 2, -2 * Math.PI * 260 * 400e-6);
    }

    [Fact]
    public void A_drifting_clock_grows_late_by_its_rate()
    {
        ClockDriftFault drift = new() { Channels = [3], DriftPartsPerMillion = 10, StartSeconds = 0 };
        Scene scene = SampledScene.Line(6, SampledScene.MixedField, drift);
        Complex[,] s = SampledScene.Covariance(scene, 20, 21, skipSeconds: 100)[1];
        Assert.Equal(Healthy[1][3, 2].Phase - (2 * Math.PI * 260 * 10e-6 * 150), s[3, 2].Phase, 0.25);
    }

    [Fact]
    public void A_swap_permutes_rows_and_columns()
    {
        Complex[,] s = Sample(SwapFault.Pair(1, 4))[0];
        AssertCoherence(s[1, 2], s, Healthy[0][4, 2], Healthy[0]);
        AssertCoherence(s[4, 1], s, Healthy[0][1, 4], Healthy[0]);
        AssertCoherence(s[0, 5], s, Healthy[0][0, 5], Healthy[0]);
    }

    [Fact]
    public void Wiring_mistakes_are_permutations()
    {
        Assert.Equal([3, 5, 1], SwapFault.Cycle([1, 3, 5]).Carries);
        Assert.Equal([5, 1, 3], SwapFault.Cycle([5, 3, 1]).Carries);
        SwapFault reversed = SwapFault.Reversed(2, 5);
        Assert.Equal([2, 3, 5, 6], reversed.Channels);
        Assert.Equal([6, 5, 3, 2], reversed.Carries);
        SwapFault shifted = SwapFault.Shifted(4, 3);
        Assert.Equal([5, 6, 4], shifted.Carries);
    }

    [Fact]
    public void Crosstalk_makes_a_channel_resemble_another()
    {
        Scene quiet = SampledScene.Line(6, [new SphericalIsotropicNoise { Spectrum = new(0) }], CrosstalkFault.Between(0, 5, -6, 90));
        Complex[,] s = SampledScene.Covariance(quiet, Frames, 22)[1];
        Complex before = SampledScene.Covariance(quiet with { Faults = [] }, Frames, 22)[1][5, 0];
        Complex leak = s[5, 0] - before;
        Assert.Equal(Math.Pow(10, -0.3), leak.Magnitude, 0.1);
        Assert.Equal(Math.PI / 2, leak.Phase, 0.2);
    }

    [Fact]
    public void Interference_adds_a_fixed_pattern_at_its_bins_only()
    {
        CoherentInterferenceFault hum = new()
        {
            Channels = [0, 3], Bins = [1], ChannelDecibels = [10, 13], ChannelPhasesDegrees = [0, 120],
        };
        Complex[][,] s = Sample(hum);
        double field = 1 + Math.Pow(10, 0.3);
        Assert.Equal(field * Math.Pow(10, 1.15), (s[1][3, 0] - Healthy[1][3, 0]).Magnitude, 0.1 * field * Math.Pow(10, 1.15));
        Assert.Equal(2 * Math.PI / 3, (s[1][3, 0] - Healthy[1][3, 0]).Phase, 0.1);
        Assert.Equal(Level(Healthy[0], 3), Level(s[0], 3), Decibel);
        Assert.Equal(Level(Healthy[1], 2), Level(s[1], 2), Decibel);
        Assert.Equal(10 * Math.Log10((field * 10) + field), Level(Sample(hum with { IsTone = true })[1], 0), Decibel);
    }

    [Fact]
    public void An_intermittent_fault_keeps_its_duty()
    {
        IntermittentFault loose = IntermittentFault.Of(new DeadFault { Channels = [3] }, 40, 0.25) with { StartSeconds = 100 };
        Assert.False(loose.IsActive(99));
        Assert.True(loose.IsActive(101));
        Assert.False(loose.IsActive(111));
        Assert.True(loose.IsActive(145));
        Assert.Equal("intermittent", loose.Kind);
    }

    [Fact]
    public void A_module_fails_as_one()
    {
        ArrayGeometry line = ArrayGeometry.UniformLine(6, 1.5, new Position(1, 0, 0), groupSize: 2);
        GroupFault module = GroupFault.Of(line, "G2", new DeadFault { Channels = [] });
        Assert.Equal([2, 3], module.Channels);
        Complex[,] s = Sample(module)[0];
        Assert.Equal(0, s[2, 2].Real + s[3, 3].Real);
        Assert.True(s[4, 4].Real > 0);
        Assert.Throws<ArgumentException>(() => GroupFault.Of(line, "none", new PolarityFault { Channels = [] }));
    }

    [Fact]
    public void A_displaced_element_hears_the_wave_elsewhere()
    {
        Scene scene = SampledScene.Line(
            2, [new PlaneWave { Spectrum = new(20), Toward = new Position(1, 0, 0) }],
            new DisplacementFault { Channels = [1], Displacement = new Position(0.5, 0, 0), StartSeconds = 50 });
        Assert.Equal(2 * Math.PI * 120 * 1.5 / 1500, SampledScene.Covariance(scene, 8, 2)[0][1, 0].Phase, 0.05);
        Assert.Equal(2 * Math.PI * 120 * 2.0 / 1500, SampledScene.Covariance(scene, 8, 2, skipSeconds: 50)[0][1, 0].Phase, 0.05);
    }

    [Fact]
    public void Lost_frames_leave_gaps_in_the_sequence_and_repeated_ones_come_again()
    {
        StreamFault broken = new() { Channels = [], MissingShare = 0.3, RepeatedShare = 0.2, LatenessSeconds = 7 };
        SceneRunner runner = new(SampledScene.Line(2, SampledScene.MixedField, broken), new RandomNumbers(4));
        float[] data = new float[runner.FrameLength], previous = new float[runner.FrameLength];
        ulong last = ulong.MaxValue;
        int lost = 0, repeated = 0;
        for (int i = 0; i < 600; i++)
        {
            runner.NextFrame(data);
            if (runner.Sequence == last)
            {
                repeated++;
                Assert.Equal(previous, data);
            }
            else
            {
                lost += (int)(runner.Sequence - last) - 1;
            }

            Assert.Equal(7, runner.LatenessSeconds);
            last = runner.Sequence;
            data.CopyTo(previous, 0);
        }

        // About 100 repeats and 214 losses, each with a deviation under 20; the bounds are five of them.
        Assert.InRange(repeated, 40, 160);
        Assert.InRange(lost, 114, 320);
    }

    [Fact]
    public void A_fault_starts_and_ends_at_its_times()
    {
        PolarityFault fault = new() { Channels = [0], StartSeconds = 10, EndSeconds = 20 };
        Assert.Equal([false, true, true, false], new[] { 9.9, 10, 19.9, 20 }.Select(fault.IsActive));
    }

    private static Complex[][,] Sample(params Fault[] faults) =>
        SampledScene.Covariance(SampledScene.Line(6, SampledScene.MixedField, faults), Frames, 20);

    private static double Level(Complex[,] s, int n) => 10 * Math.Log10(s[n, n].Real);

    private static void AssertOthersKept(Complex[,] s, int except)
    {
        for (int n = 0; n < 6; n++)
        {
            if (n == except) continue;
            Assert.Equal(Level(Healthy[0], n), Level(s, n), Decibel);
        }
    }

    private static void AssertCoherence(Complex[,] s, Complex[,] healthy, int l, int m, double turn) =>
        Assert.True(
            (SampledScene.Coherence(s, l, m) - (SampledScene.Coherence(healthy, l, m) * Complex.FromPolarCoordinates(1, turn))).Magnitude < Part,
            $"{SampledScene.Coherence(s, l, m)} is not {SampledScene.Coherence(healthy, l, m)} turned by {turn}");

    private static void AssertCoherence(Complex entry, Complex[,] s, Complex expected, Complex[,] healthy) =>
        Assert.True(
            ((entry / s[0, 0].Real) - (expected / healthy[0, 0].Real)).Magnitude < Part, $"{entry} is not {expected}");
}
