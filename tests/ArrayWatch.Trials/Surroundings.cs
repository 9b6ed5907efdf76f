using ArrayWatch.Signals;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Fields;

namespace ArrayWatch.Trials;

/// <summary>
/// Draws an ordinary healthy array in an ordinary field. Half of them are lines of 16 to 48 hydrophones at 0.5 to 3 m,
/// with 8 to 12 bins from a fifth to 0.95 of the frequency of half a wavelength; half are 9 to 32
/// microphones spread over a disc of 0.5 to 3 m radius, 60 to 800 Hz. Diffuse noise (spherical in water,
/// cylindrical in air, falling 0 to 6 dB an octave), one or two plane waves 3 to 8 dB above it from anywhere, microphones with
/// wind 6 to 12 dB below it at 200 Hz and falling 9 dB an octave. Self-noise 12 to 20 dB below; gains spread 0.3 dB rms, phases
/// 1° rms, self-noise 1 dB rms. Snapshots 0.25 to 1 s apart, frames of 2 to 8 s.
/// </summary>
internal static class Surroundings
{
    public static Scene Draw(RandomNumbers random)
    {
        bool inWater = random.NextDouble() < 0.5;
        double interval = random.Between(0.25, 1);
        int perFrame = Math.Max(1, (int)Math.Round(random.Between(2, 8) / interval));
        return inWater ? Line(random, interval, perFrame) : Microphones(random, interval, perFrame);
    }

    public static bool IsLine(Scene scene) => scene.SoundSpeed > 1000;

    private static Scene Line(RandomNumbers random, double interval, int perFrame)
    {
        int count = random.Integer(16, 48), bins = random.Integer(8, 12);
        double spacing = random.Between(0.5, 3), slope = random.Between(-6, 0);
        const double Speed = 1500;
        double top = 0.95 * Speed / (2 * spacing), bottom = 0.2 * Speed / (2 * spacing);
        return new Scene
        {
            Geometry = ArrayGeometry.UniformLine(count, spacing, new Position(1, 0, 0), "H", 1, 8),
            SoundSpeed = Speed,
            Frequencies = [.. Enumerable.Range(0, bins).Select(i => bottom + ((top - bottom) * i / (bins - 1)))],
            SnapshotIntervalSeconds = interval,
            SnapshotsPerFrame = perFrame,
            Sources = [new SphericalIsotropicNoise { Spectrum = new(0, slope, top) }, .. Waves(random, slope, top)],
            SelfNoise = new(-random.Between(12, 20), slope, top),
            Responses = ChannelResponse.Spread(count, 0.3, 1, 1, random),
        };
    }

    private static Scene Microphones(RandomNumbers random, double interval, int perFrame)
    {
        int count = random.Integer(9, 32), bins = random.Integer(8, 12);
        double slope = random.Between(-6, 0);
        return new Scene
        {
            Geometry = PlanarLayout.Irregular(count, random.Between(0.5, 3), random, "M", 4),
            SoundSpeed = 340,
            Frequencies = [.. Enumerable.Range(0, bins).Select(i => 60 * Math.Pow(800.0 / 60, i / (bins - 1.0)))],
            SnapshotIntervalSeconds = interval,
            SnapshotsPerFrame = perFrame,
            Sources =
            [
                new CylindricalIsotropicNoise { Spectrum = new(0, slope, 200) },
                .. Waves(random, slope, 200),
                new WindNoise
                {
                    Spectrum = new(-random.Between(6, 12), -9, 200), TowardRadians = random.Between(-Math.PI, Math.PI),
                    SpeedMetresPerSecond = random.Between(2, 8),
                },
            ],
            SelfNoise = new(-random.Between(12, 20), slope, 200),
            Responses = ChannelResponse.Spread(count, 0.3, 1, 1, random),
        };
    }

    private static PlaneWave[] Waves(RandomNumbers random, double slope, double reference) =>
    [
        .. Enumerable.Range(0, random.Integer(1, 2)).Select(_ => new PlaneWave
        {
            Spectrum = new(random.Between(3, 8), slope, reference),
            Toward = Position.Direction(random.Between(-Math.PI, Math.PI), random.Between(-0.3, 0.3)),
        }),
    ];
}
