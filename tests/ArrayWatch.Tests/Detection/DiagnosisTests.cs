using ArrayWatch.Detection;
using ArrayWatch.Signals;
using ArrayWatch.Signals.Covariance;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;
using ArrayWatch.Simulation.Fields;

namespace ArrayWatch.Tests.Detection;

/// <summary>
/// A line of 20 in diffuse noise with one wave 5 dB above it, self-noise 15 dB below; memory 30 s; the fault at 120 s. The generator's
/// start value is fixed, so that a pass is a pass for ever; with a fresh one each case fails in fewer than one run of a hundred (trials).
/// </summary>
public sealed class DiagnosisTests
{
    private const double Memory = 30;
    private const double FaultAt = 120;

    public static TheoryData<string, int[]> Faults => new()
    {
        { "dead", [7] },
        { "gain", [3] },
        { "excess-noise", [11] },
        { "polarity", [5] },
        { "phase", [12] },
        { "delay", [8] },
        { "swap", [4, 5] },
        { "swap", [2, 15] },
        { "coherent-interference", [6, 7, 8, 9, 10] },
    };

    [Theory]
    [MemberData(nameof(Faults))]
    public void A_fault_is_named_with_its_channels_and_nothing_else_is(string kind, int[] channels)
    {
        List<Finding> raised = Play([Fault(kind, channels)], 330, out Diagnosis last);
        Finding finding = Assert.Single(raised);
        Assert.Equal(kind, finding.Kind);
        Assert.Equal(channels, finding.Indices);
        Assert.InRange(finding.OnsetSeconds, FaultAt - 15, FaultAt + 60);
        if (kind == "swap") Assert.Equal(new Dictionary<int, int> { [channels[0]] = channels[1], [channels[1]] = channels[0] }, finding.Estimate["mapping"]);
        if (kind == "phase") Assert.InRange((double)last.Findings[0].Estimate["phaseDegrees"], 37, 43);
        if (kind == "delay") Assert.InRange((double)last.Findings[0].Estimate["delayMicroseconds"], 180, 220);
        if (kind == "gain") Assert.InRange((double)last.Findings[0].Estimate["gainDecibels"], -8.6, -7.4);
        Assert.Equal(kind is "dead" or "excess-noise", channels.All(i => !last.Corrections[i].Use));
    }

    [Fact]
    public void A_healthy_array_raises_nothing_and_trusts_every_channel()
    {
        Assert.Empty(Play([], 600, out Diagnosis last));
        Assert.All(last.Channels, c => Assert.Equal(Standing.Trusted, c.Standing));
        Assert.True(last.Field.Understood);
        Assert.InRange(last.Field.Misfit!.Value, 0, 0.1);
    }

    [Fact]
    public void A_module_that_dies_is_one_finding()
    {
        List<Finding> raised = Play([new DeadFault { Channels = [5, 6, 7, 8, 9], RemainingDecibels = -30, StartSeconds = FaultAt }], 330, out _);
        Finding finding = Assert.Single(raised);
        Assert.Equal(("dead", "G2"), (finding.Kind, finding.Group));
        Assert.Equal([5, 6, 7, 8, 9], finding.Indices);
    }

    [Fact]
    public void A_fault_that_is_mended_returns_to_normal()
    {
        Play([new PolarityFault { Channels = [5], StartSeconds = FaultAt, EndSeconds = 300 }], 600, out Diagnosis last);
        Assert.Empty(last.Findings);
        Assert.Equal(Standing.Trusted, last.Channels[5].Standing);
    }

    [Fact]
    public void Channels_that_share_nothing_are_neither_trusted_nor_an_error()
    {
        Random random = new(5);
        ArrayGeometry geometry = ArrayGeometry.UniformLine(4, 1, new Position(1, 0, 0));
        ArrayDiagnosis diagnosis = new(geometry, new DiagnosisOptions { TimeConstantSeconds = 10, LookDirections = [new("broadside", 90, 0)] });
        ExponentialCovariance fast = new(4, 2, TimeSpan.FromSeconds(10)), recent = new(4, 2, TimeSpan.FromSeconds(2.5));
        float[] data = new float[2 * 20 * 2 * 4];
        for (int k = 0; k < 40; k++)
        {
            for (int i = 0; i < data.Length; i++) data[i] = (float)(random.NextDouble() - random.NextDouble());
            fast.Fold(data, 20, 0.1, 0);
            recent.Fold(data, 20, 0.1, 0);
            Diagnosis d = diagnosis.Decide(new DecisionInput { TimeSeconds = 2 * k, Frequencies = [100, 200], SoundSpeed = 1500, Recent = recent, Fast = fast });
            Assert.DoesNotContain(d.Findings, f => f.Kind is "phase" or "delay" or "polarity" or "swap");
        }
    }

    [Fact]
    public void Silence_on_every_channel_is_no_error()
    {
        ArrayDiagnosis diagnosis = new(Line(), new DiagnosisOptions { TimeConstantSeconds = 10 });
        ExponentialCovariance fast = new(20, 1, TimeSpan.FromSeconds(10)), recent = new(20, 1, TimeSpan.FromSeconds(2.5));
        float[] zeros = new float[2 * 100 * 20];
        fast.Fold(zeros, 100, 0.1, 0);
        recent.Fold(zeros, 100, 0.1, 0);
        Diagnosis d = diagnosis.Decide(new DecisionInput { TimeSeconds = 10, Frequencies = [100], SoundSpeed = 1500, Recent = recent, Fast = fast });
        Assert.All(d.Channels, c => Assert.Equal(Standing.Unknown, c.Standing));
    }

    [Fact]
    public void An_unknown_field_component_is_refused_with_the_known_ones()
    {
        ArgumentException e = Assert.Throws<ArgumentException>(() => new ArrayDiagnosis(Line(), new DiagnosisOptions { FieldComponents = ["isotropc"] }));
        Assert.Contains("isotropc", e.Message, StringComparison.Ordinal);
        Assert.Contains("plane-waves", e.Message, StringComparison.Ordinal);
    }

    private static ArrayGeometry Line() => ArrayGeometry.UniformLine(20, 0.75, new Position(1, 0, 0), "H", 1, 5);

    private static Fault Fault(string kind, int[] channels) => kind switch
    {
        "dead" => new DeadFault { Channels = channels, RemainingDecibels = -30, StartSeconds = FaultAt },
        "gain" => new GainFault { Channels = channels, GainDecibels = -8, StartSeconds = FaultAt },
        "excess-noise" => new ExcessNoiseFault { Channels = channels, ExcessDecibels = 12, StartSeconds = FaultAt },
        "polarity" => new PolarityFault { Channels = channels, StartSeconds = FaultAt },
        "phase" => new PhaseFault { Channels = channels, PhaseDegrees = 40, StartSeconds = FaultAt },
        "delay" => new DelayFault { Channels = channels, DelayMicroseconds = 200, StartSeconds = FaultAt },
        "swap" => SwapFault.Pair(channels[0], channels[1]) with { StartSeconds = FaultAt },
        _ => new CoherentInterferenceFault
        {
            Channels = channels, Bins = [3], ChannelDecibels = [6, 5, 6, 4, 5], ChannelPhasesDegrees = [0, 130, -60, 90, -150], StartSeconds = FaultAt,
        },
    };

    private static List<Finding> Play(Fault[] faults, double seconds, out Diagnosis last)
    {
        Scene scene = new()
        {
            Geometry = Line(),
            SoundSpeed = 1500,
            Frequencies = [200, 300, 400, 500, 600, 700, 800, 900],
            SnapshotIntervalSeconds = 0.25,
            SnapshotsPerFrame = 10,
            Sources = [new SphericalIsotropicNoise { Spectrum = new(0) }, new PlaneWave { Spectrum = new(5), Toward = Position.Direction(0.9, 0.1) }],
            Faults = faults,
        };
        SceneRunner runner = new(scene, new RandomNumbers(20260501));
        ArrayDiagnosis diagnosis = new(scene.Geometry, new DiagnosisOptions { TimeConstantSeconds = Memory });
        ExponentialCovariance fast = new(20, 8, TimeSpan.FromSeconds(Memory)), recent = new(20, 8, TimeSpan.FromSeconds(Memory / 4));
        float[] data = new float[runner.FrameLength];
        List<Finding> raised = [];
        IReadOnlyList<Finding> standing = [];
        Diagnosis? decided = null;
        double next = 0;
        while (runner.LastSnapshotSeconds < seconds)
        {
            runner.NextFrame(data);
            fast.Fold(data, 10, 0.25, 0);
            recent.Fold(data, 10, 0.25, 0);
            if (runner.LastSnapshotSeconds < next) continue;
            next = runner.LastSnapshotSeconds + (Memory / 6);
            decided = diagnosis.Decide(new DecisionInput
            {
                TimeSeconds = runner.LastSnapshotSeconds, Frequencies = scene.Frequencies, SoundSpeed = 1500, Recent = recent, Fast = fast,
            });
            raised.AddRange(decided.Findings.Where(f => !standing.Any(f.IsSameFaultAs)));
            standing = decided.Findings;
        }

        last = decided!;
        return raised;
    }
}
