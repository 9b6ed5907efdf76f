using ArrayWatch.Detection;
using ArrayWatch.Signals;
using ArrayWatch.Signals.Covariance;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Fields;
using BenchmarkDotNet.Attributes;

namespace ArrayWatch.Benchmarks;

/// <summary>One decision on a line of N at 0.75 m with a healthy field of four bins, as it recurs: model and trust from the last one.</summary>
public class DecisionBenchmarks
{
    private const double MemorySeconds = 60;
    private const double SoundSpeed = 1500;
    private static readonly double[] s_frequencies = [200, 400, 600, 800];
    private ArrayDiagnosis? _diagnosis;
    private DecisionInput? _input;
    private double _time;

    [ParamsSource(nameof(AllChannels))]
    public int Channels { get; set; }

    public static IEnumerable<int> AllChannels => Sizes.DecisionChannels;

    [GlobalSetup]
    public void Setup()
    {
        ArrayGeometry line = ArrayGeometry.UniformLine(Channels, 0.75, new Position(1, 0, 0), "H");
        Scene scene = new()
        {
            Geometry = line,
            SoundSpeed = SoundSpeed,
            Frequencies = s_frequencies,
            SnapshotIntervalSeconds = MemorySeconds / (2 * Channels),
            SnapshotsPerFrame = 16,
            Sources = [new SphericalIsotropicNoise { Spectrum = new(0) }, new PlaneWave { Spectrum = new(4), Toward = Position.Direction(0.35, 0) }],
        };
        SceneRunner runner = new(scene, new RandomNumbers(20_270_206));
        ExponentialCovariance recent = new(Channels, s_frequencies.Length, TimeSpan.FromSeconds(MemorySeconds / 4));
        ExponentialCovariance fast = new(Channels, s_frequencies.Length, TimeSpan.FromSeconds(MemorySeconds));
        float[] frame = new float[runner.FrameLength];
        for (int k = 0; k < 4 * Channels; k += scene.SnapshotsPerFrame)
        {
            runner.NextFrame(frame);
            recent.Fold(frame, scene.SnapshotsPerFrame, scene.SnapshotIntervalSeconds, 0);
            fast.Fold(frame, scene.SnapshotsPerFrame, scene.SnapshotIntervalSeconds, 0);
        }

        _diagnosis = new ArrayDiagnosis(line, new DiagnosisOptions { TimeConstantSeconds = MemorySeconds });
        _input = new DecisionInput { TimeSeconds = 0, Frequencies = s_frequencies, SoundSpeed = SoundSpeed, Recent = recent, Fast = fast };
        Decide();
    }

    [Benchmark]
    public Diagnosis Decide()
    {
        _time += MemorySeconds / 6;
        return _diagnosis!.Decide(_input! with { TimeSeconds = _time });
    }
}
