using ArrayWatch.Signals;
using ArrayWatch.Simulation.Faults;
using ArrayWatch.Simulation.Fields;
using ArrayWatch.Simulation.Levels;
using ArrayWatch.Simulation.Shapes;

namespace ArrayWatch.Simulation;

/// <summary>
/// Two invented arrays for the demonstration: a towed line and microphones in a field. Both give sixteen
/// snapshots a second, so that a memory of seconds suffices, and suffer one fault after another
/// from half a minute on: each lasts a minute, and half a minute of good order follows.
/// </summary>
public static class DemoScenes
{
    private const double FirstFaultSeconds = 30;
    private const double FaultSeconds = 60;
    private const double PeriodSeconds = 90;

    /// <summary>Every scene.</summary>
    public static IReadOnlyList<DemoScene> All() => [TowedLine(), FieldMicrophones()];

    /// <summary>A line of 24 hydrophones in three modules: ambient noise, a distant source ahead and a ship that passes.</summary>
    public static DemoScene TowedLine()
    {
        RandomNumbers random = new(20_240);
        ArrayGeometry line = ArrayGeometry.UniformLine(24, 0.75, new Position(1, 0, 0), "H", 1, 8);
        Scene scene = new()
        {
            Geometry = line,
            SoundSpeed = 1500,
            Frequencies = [.. Enumerable.Range(0, 12).Select(i => 200.0 + (60 * i))],
            SnapshotIntervalSeconds = 1.0 / 16,
            SnapshotsPerFrame = 8,
            Sources =
            [
                new SphericalIsotropicNoise { Spectrum = new(0, -5, 300) },
                new PlaneWave { Spectrum = new(4, -5, 300), Toward = Position.Direction(0.35, 0) },
                new MovingShip
                {
                    Spectrum = new(6, -6, 300), ClosestSeconds = 600, ClosestRangeMetres = 900,
                    ClosestBearingRadians = 1.2, SpeedMetresPerSecond = 4,
                },
            ],
            SelfNoise = new(-16, -5, 300),
            Responses = ChannelResponse.Spread(line.Count, 0.4, 1.5, 1, random),
            Shape = new LineBow(0.03, new Position(0, 1, 0), 900),
            Faults = OneAfterAnother(
                new DeadFault { Channels = [6], RemainingDecibels = -32 },
                SwapFault.Pair(10, 16),
                new PhaseFault { Channels = [3], PhaseDegrees = 45 },
                CoherentInterferenceFault.RandomPattern([.. Enumerable.Range(8, 8)], [5], 6, 2, random),
                new GainFault { Channels = [19], GainDecibels = -7 },
                new PolarityFault { Channels = [13] },
                new DelayFault { Channels = [21], DelayMicroseconds = 200 },
                GroupFault.Of(line, "G3", new DeadFault { Channels = [], RemainingDecibels = -30 }),
                new ExcessNoiseFault { Channels = [1], ExcessDecibels = 12 }),
        };
        return new("plover", "Towed line Plover", scene, TimeSpan.FromSeconds(12), ["isotropic", "plane-waves", "channel-noise"]);
    }

    /// <summary>Sixteen microphones in a meadow in four boxes: traffic round the horizon, a pump near by and gusty wind.</summary>
    public static DemoScene FieldMicrophones()
    {
        RandomNumbers random = new(31_077);
        ArrayGeometry meadow = PlanarLayout.Irregular(16, 0.9, random, "M", 4);
        Scene scene = new()
        {
            Geometry = meadow,
            SoundSpeed = 340.5,
            Frequencies = [100, 150, 200, 250, 300, 400, 500, 600, 700, 800],
            SnapshotIntervalSeconds = 1.0 / 16,
            SnapshotsPerFrame = 8,
            Sources =
            [
                new CylindricalIsotropicNoise { Spectrum = new(0, -4, 200) },
                new PlaneWave { Spectrum = new(5, -4, 200), Toward = Position.Direction(2.2, 0.05) },
                new PlaneWave { Spectrum = new(2, -3, 200), Toward = Position.Direction(-1.1, 0.2), Level = new Swing(240, 6) },
                new WindNoise
                {
                    Spectrum = new(-9, -9, 200), TowardRadians = 0.6, SpeedMetresPerSecond = 5,
                    ChannelDecibels = [.. Enumerable.Range(0, 16).Select(_ => 1.5 * random.NextGaussian())],
                    Level = new Gusts(2, 15, 77),
                },
            ],
            SelfNoise = new(-22),
            Responses = ChannelResponse.Spread(meadow.Count, 0.3, 1, 1, random),
            Faults = OneAfterAnother(
                new PolarityFault { Channels = [4] },
                new GainFault { Channels = [9], GainDecibels = -6.5 },
                new ExcessNoiseFault { Channels = [14], ExcessDecibels = 13 },
                SwapFault.Pair(2, 11),
                new DeadFault { Channels = [7], RemainingDecibels = null },
                CoherentInterferenceFault.RandomPattern([.. Enumerable.Range(0, 16)], [1], 8, 3, random),
                new DelayFault { Channels = [12], DelayMicroseconds = 250 },
                new PhaseFault { Channels = [0], PhaseDegrees = -50 }),
        };
        return new("meadow", "Field microphones Meadow", scene, TimeSpan.FromSeconds(12), ["isotropic", "plane-waves", "channel-noise"]);
    }

    private static Fault[] OneAfterAnother(params Fault[] faults) =>
    [
        .. faults.Select((fault, i) => fault with
        {
            StartSeconds = FirstFaultSeconds + (i * PeriodSeconds),
            EndSeconds = FirstFaultSeconds + (i * PeriodSeconds) + FaultSeconds,
        }),
    ];
}
