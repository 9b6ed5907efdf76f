using System.Text.Json.Nodes;
using ArrayWatch.Demo;
using ArrayWatch.Signals;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;
using ArrayWatch.Simulation.Fields;

namespace ArrayWatch.EndToEnd.Tests.Service;

/// <summary>One array a kind of fault, each of its own name, all alike but for the fault.</summary>
internal static class FaultyArrays
{
    private const double FaultSeconds = 40;
    private const int Frames = 240;
    private const int Channels = 16;
    private const double Epoch = 1_777_608_750;

    /// <summary>The fault of each array, by the array's id, which is the fault's kind.</summary>
    public static IReadOnlyDictionary<string, Fault> All { get; } = ((Fault[])
    [
        new DeadFault { Channels = [5], RemainingDecibels = -30 },
        new GainFault { Channels = [3], GainDecibels = -7 },
        new ExcessNoiseFault { Channels = [8], ExcessDecibels = 12 },
        new PolarityFault { Channels = [11] },
        new PhaseFault { Channels = [4], PhaseDegrees = 50 },
        new DelayFault { Channels = [9], DelayMicroseconds = 250 },
        SwapFault.Pair(2, 12),
        CoherentInterferenceFault.RandomPattern([4, 5, 6, 7, 8, 9], [3], 6, 2, new RandomNumbers(5)),
    ]).ToDictionary(static f => f.Kind, static f => f with { StartSeconds = FaultSeconds });

    public static JsonObject Configuration(int brokerPort, int webPort) => new()
    {
        ["broker"] = new JsonObject { ["port"] = brokerPort },
        ["store"] = new JsonObject { ["path"] = "store.db" },
        ["web"] = new JsonObject { ["url"] = $"http://127.0.0.1:{webPort}" },
        ["arrays"] = new JsonArray([.. All.Keys.Select(static id => new JsonObject
        {
            ["id"] = id,
            ["medium"] = new JsonObject { ["soundSpeed"] = 1500 },
            ["line"] = new JsonObject { ["count"] = Channels, ["spacing"] = 0.75, ["labelPrefix"] = "H" },
            ["averaging"] = new JsonObject { ["timeConstant"] = 12, ["slowTimeConstant"] = 360 },
        })]),
    };

    /// <summary>Two minutes of event time, sent as fast as the service takes them. Fixed start values: every run sends the same bytes.</summary>
    public static async Task PlayAsync(Watcher watcher)
    {
        foreach ((string id, Fault fault) in All)
        {
            Scene scene = new()
            {
                Geometry = ArrayGeometry.UniformLine(Channels, 0.75, new Position(1, 0, 0), "H"),
                SoundSpeed = 1500,
                Frequencies = [.. Enumerable.Range(0, 10).Select(static i => 200.0 + (70 * i))],
                SnapshotIntervalSeconds = 1.0 / 16,
                SnapshotsPerFrame = 8,
                StartTimeSeconds = Epoch,
                Sources =
                [
                    new SphericalIsotropicNoise { Spectrum = new(0, -5, 300) },
                    new PlaneWave { Spectrum = new(4, -5, 300), Toward = Position.Direction(0.5, 0) },
                ],
                SelfNoise = new(-16, -5, 300),
                Faults = [fault],
            };
            SceneRunner runner = new(scene, new RandomNumbers(11));
            float[] data = new float[runner.FrameLength];
            int[] shape = [scene.SnapshotsPerFrame, scene.Frequencies.Count, Channels];
            for (int frame = 0; frame < Frames; frame++)
            {
                runner.NextFrame(data);
                byte[] body = FrameWriter.Write(runner.TimeSeconds, runner.Sequence, scene.SnapshotIntervalSeconds, scene.Frequencies, shape, data);
                await watcher.PublishAsync($"arraywatch/{id}/snapshots", body);
            }
        }
    }
}
