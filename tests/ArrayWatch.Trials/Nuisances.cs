using ArrayWatch.Signals;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Fields;
using ArrayWatch.Simulation.Levels;
using ArrayWatch.Simulation.Shapes;

namespace ArrayWatch.Trials;

/// <summary>What happens to healthy arrays and is no fault. Each takes an ordinary scene and adds its trouble.</summary>
internal static class Nuisances
{
    private delegate Scene Draw(Scene scene, RandomNumbers random);

    private static readonly Dictionary<string, Draw> Kinds = new(StringComparer.Ordinal)
    {
        ["quiet"] = (s, _) => s,
        ["moving-ship"] = (s, r) => With(s, new MovingShip
        {
            Spectrum = new(r.Between(5, 15), -4, s.Frequencies[0]), ClosestSeconds = r.Between(1500, 6000), ClosestRangeMetres = r.Between(300, 3000),
            ClosestBearingRadians = r.Between(-3, 3), SpeedMetresPerSecond = r.Sign() * r.Between(2, 8),
        }),
        ["near-field"] = (s, r) => With(s, new NearFieldSource
        {
            Spectrum = new(r.Between(0, 8), -3, s.Frequencies[0]),
            At = s.Geometry.Centroid + ((s.Geometry.ApertureMetres * r.Between(0.8, 3)) * Position.Direction(r.Between(-3, 3), 0)),
        }),
        ["two-paths"] = (s, r) => With(s, new CorrelatedPaths
        {
            Spectrum = new(r.Between(3, 8), -3, s.Frequencies[0]), Toward = Position.Direction(r.Between(-3, 3), 0),
            ReflectedToward = Position.Direction(r.Between(-3, 3), r.Between(-0.8, 0.8)), ReflectionDecibels = -r.Between(0, 6),
            ReflectionDelaySeconds = r.Between(0.001, 0.02),
        }),
        ["wind"] = (s, r) => With(s, new WindNoise
        {
            Spectrum = new(r.Between(-6, 3), -9, s.Frequencies[0]), TowardRadians = r.Between(-3, 3), SpeedMetresPerSecond = r.Between(3, 12),
            ChannelDecibels = [.. Enumerable.Range(0, s.Geometry.Count).Select(_ => 1.5 * r.NextGaussian())], Level = new Gusts(3, 20, r.NextBits()),
        }),
        ["shots"] = (s, r) => With(s, new Transients
        {
            Spectrum = new(30), SlotSeconds = r.Between(60, 600), DurationSeconds = r.Between(0.5, 2), StartValue = r.NextBits(),
        }),
        ["level-changes"] = (s, r) => s with
        {
            Sources = [.. s.Sources.Select((f, i) => f with { Level = i == 0 ? new Swing(r.Between(600, 3600), 12, r.Between(0, 6)) : new Ramp(r.Between(1300, 4000), r.Between(120, 600), r.Sign() * 12) })],
        },
        ["misplaced"] = (s, r) => s with
        {
            Misplacements = [.. Enumerable.Range(0, s.Geometry.Count).Select(_ => (s.SoundSpeed * 10e-6) * new Position(r.NextGaussian(), r.NextGaussian(), r.NextGaussian()))],
        },
        ["bow"] = (s, r) => s with { Shape = new LineBow(s.Geometry.ApertureMetres * r.Between(0.005, 0.03), new Position(0, 1, 0), r.Between(900, 3600)) },
        ["snake"] = (s, r) => s with { Shape = new LineSnake(s.Geometry.ApertureMetres * r.Between(0.002, 0.01), new Position(0, 1, 0), r.Between(0.7, 1.5), r.Between(900, 3600)) },
        ["spread"] = (s, r) => s with { Responses = ChannelResponse.Spread(s.Geometry.Count, 0.8, 3, 3, r) },
        ["sound-speed"] = (s, r) => s with { SoundSpeed = s.SoundSpeed * (1 + (r.Sign() * r.Between(0.005, 0.015))) },
    };

    public static IReadOnlyCollection<string> Names => Kinds.Keys;

    public static bool Has(string name) => Kinds.ContainsKey(name);

    public static Scene Add(string name, Scene scene, RandomNumbers random) => Kinds[name](scene, random);

    private static Scene With(Scene scene, FieldSource source) => scene with { Sources = [.. scene.Sources, source] };
}
