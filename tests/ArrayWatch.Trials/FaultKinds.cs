using ArrayWatch.Detection;
using ArrayWatch.Signals;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;

namespace ArrayWatch.Trials;

/// <summary>
/// Draws faults. Sizes that a tolerance bounds are <c>size</c> times the tolerance, of either sign; channels are drawn evenly.
/// </summary>
internal static class FaultKinds
{
    private delegate Fault Draw(Scene scene, double size, RandomNumbers random);

    private static readonly Tolerances Limits = new();

    private static readonly Dictionary<string, Draw> Kinds = new(StringComparer.Ordinal)
    {
        ["dead"] = (s, _, r) => new DeadFault { Channels = One(s, r), RemainingDecibels = -r.Between(15, 40) },
        ["dead-zeros"] = (s, _, r) => new DeadFault { Channels = One(s, r) },
        ["dead-module"] = (s, _, r) => GroupFault.Of(
            s.Geometry, $"G{r.Integer(1, s.Geometry.Count / (Surroundings.IsLine(s) ? 8 : 4))}", new DeadFault { Channels = [], RemainingDecibels = -30 }),
        ["gain-down"] = (s, size, r) => new GainFault { Channels = One(s, r), GainDecibels = -size * Limits.GainDecibels },
        ["gain-up"] = (s, size, r) => new GainFault { Channels = One(s, r), GainDecibels = size * Limits.GainDecibels },
        ["rolloff"] = (s, size, r) => RollOff(s, size, r),
        ["excess-noise"] = (s, size, r) => new ExcessNoiseFault { Channels = One(s, r), ExcessDecibels = size * Limits.ExcessDecibels },
        ["polarity"] = (s, _, r) => new PolarityFault { Channels = One(s, r) },
        ["phase"] = (s, size, r) => new PhaseFault { Channels = One(s, r), PhaseDegrees = r.Sign() * size * Limits.PhaseDegrees },
        ["phase-60"] = (s, _, r) => new PhaseFault { Channels = One(s, r), PhaseDegrees = r.Sign() * 60 },
        ["delay"] = (s, size, r) => new DelayFault { Channels = One(s, r), DelayMicroseconds = r.Sign() * size * Limits.DelayMicroseconds },
        ["delay-300"] = (s, _, r) => new DelayFault { Channels = One(s, r), DelayMicroseconds = r.Sign() * 300 },
        ["clock-drift"] = (s, _, r) => new ClockDriftFault { Channels = Run(s, r, 4), DriftPartsPerMillion = r.Sign() * r.Between(1, 3) },
        ["swap-adjacent"] = (s, _, r) => Adjacent(s, r),
        ["swap-distant"] = (s, _, r) => Distant(s, r),
        ["swap-cycle"] = (s, _, r) => SwapFault.Cycle(r.Choose(3, s.Geometry.Count)),
        ["swap-reversed"] = (s, _, r) => SwapFault.Reversed(r.Integer(0, s.Geometry.Count - 6), 6),
        ["swap-shifted"] = (s, _, r) => SwapFault.Shifted(r.Integer(0, s.Geometry.Count - 5), 5),
        ["crosstalk"] = (s, _, r) => Leak(s, r),
        ["interference-some"] = (s, _, r) => CoherentInterferenceFault.RandomPattern(
            r.Choose(r.Integer(3, s.Geometry.Count / 2), s.Geometry.Count), r.Choose(r.Integer(1, 2), s.Frequencies.Count), r.Between(0, 10), 2, r),
        ["interference-all"] = (s, _, r) => CoherentInterferenceFault.RandomPattern(
            [.. Enumerable.Range(0, s.Geometry.Count)], r.Choose(r.Integer(1, 2), s.Frequencies.Count), r.Between(0, 10), 3, r),
        ["intermittent"] = (s, _, r) => IntermittentFault.Of(new DeadFault { Channels = One(s, r), RemainingDecibels = -30 }, r.Between(150, 240), 0.5),
        ["displaced"] = (s, _, r) => new DisplacementFault { Channels = One(s, r), Displacement = Shift(s, r) },
    };

    public static IReadOnlyCollection<string> Names => Kinds.Keys;

    public static bool Has(string name) => Kinds.ContainsKey(name);

    public static Fault Of(string name, Scene scene, double size, double startSeconds, RandomNumbers random) =>
        Kinds[name](scene, size, random) with { StartSeconds = startSeconds };

    private static int[] One(Scene scene, RandomNumbers random) => [random.Integer(0, scene.Geometry.Count - 1)];

    private static int[] Run(Scene scene, RandomNumbers random, int count)
    {
        int first = random.Integer(0, (scene.Geometry.Count / count) - 1) * count;
        return [.. Enumerable.Range(first, count)];
    }

    // Twice the tolerance (or as asked) at the middle of the band in level, rising over it.
    private static RollOffFault RollOff(Scene scene, double size, RandomNumbers random)
    {
        double middle = Math.Sqrt(scene.Frequencies[0] * scene.Frequencies[^1]);
        double ratio = Math.Sqrt(Decibels.ToPower(size * Limits.GainDecibels / 2) - 1);
        return new RollOffFault { Channels = One(scene, random), CornerHertz = middle / ratio, Order = 2, TurnsPhase = false };
    }

    private static CrosstalkFault Leak(Scene scene, RandomNumbers random)
    {
        int[] order = random.Permutation(scene.Geometry.Count);
        return CrosstalkFault.Between(order[0], order[1], -random.Between(3, 8), random.Between(-60, 60));
    }

    private static SwapFault Adjacent(Scene scene, RandomNumbers random)
    {
        int first = random.Integer(0, scene.Geometry.Count - 2);
        return SwapFault.Pair(first, first + 1);
    }

    private static SwapFault Distant(Scene scene, RandomNumbers random)
    {
        while (true)
        {
            int[] pair = random.Choose(2, scene.Geometry.Count);
            if (pair[1] - pair[0] >= scene.Geometry.Count / 4) return SwapFault.Pair(pair[0], pair[1]);
        }
    }

    private static Position Shift(Scene scene, RandomNumbers random) =>
        (scene.SoundSpeed * 300e-6) * Position.Direction(Surroundings.IsLine(scene) ? 0 : random.Between(-Math.PI, Math.PI), 0);
}
