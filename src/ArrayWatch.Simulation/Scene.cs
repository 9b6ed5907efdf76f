using ArrayWatch.Signals;
using ArrayWatch.Simulation.Faults;
using ArrayWatch.Simulation.Fields;
using ArrayWatch.Simulation.Shapes;

namespace ArrayWatch.Simulation;

/// <summary>
/// An array in a noise field, with everything that goes wrong and when. Immutable; together with a start
/// value it fixes every number that a <see cref="SceneRunner"/> gives. Times are seconds since the
/// scene's start, levels are dB re 1 unit².
/// </summary>
public sealed record Scene
{
    /// <summary>The array as its configuration describes it.</summary>
    public required ArrayGeometry Geometry { get; init; }

    /// <summary>True sound speed, m/s, positive.</summary>
    public required double SoundSpeed { get; init; }

    /// <summary>Bin centres, hertz, ascending and positive; F of them.</summary>
    public required IReadOnlyList<double> Frequencies { get; init; }

    /// <summary>Seconds from one snapshot to the next, positive.</summary>
    public required double SnapshotIntervalSeconds { get; init; }

    /// <summary>Snapshots to a frame, K ≥ 1.</summary>
    public required int SnapshotsPerFrame { get; init; }

    /// <summary>What sounds.</summary>
    public required IReadOnlyList<FieldSource> Sources { get; init; }

    /// <summary>Event time of the first snapshot, seconds since 1970.</summary>
    public double StartTimeSeconds { get; init; }

    /// <summary>Self-noise of a channel.</summary>
    /// <value>Default −15 dB re 1 unit² at every frequency.</value>
    public Spectrum SelfNoise { get; init; } = new(-15);

    /// <summary>Healthy channels' responses, one a channel; empty for perfect ones.</summary>
    public IReadOnlyList<ChannelResponse> Responses { get; init; } = [];

    /// <summary>True place minus configured place from the start, metres, one a channel; empty for none.</summary>
    public IReadOnlyList<Position> Misplacements { get; init; } = [];

    /// <summary>How the shape departs from the configured one over time; null for rigid.</summary>
    public IArrayShape? Shape { get; init; }

    /// <summary>How often a changing shape is looked at, seconds.</summary>
    /// <value>Default 10.</value>
    public double ShapeStepSeconds { get; init; } = 10;

    /// <summary>What goes wrong, in the order in which it acts on a signal.</summary>
    public IReadOnlyList<Fault> Faults { get; init; } = [];

    /// <summary>Seconds of one frame.</summary>
    public double FrameSeconds => SnapshotIntervalSeconds * SnapshotsPerFrame;

    /// <summary>Mean power of the field at a sensor with every level curve at 0 dB, unit².</summary>
    public double FieldPowerAt(double frequencyHertz) => Sources.Sum(s => s.MeanPower(frequencyHertz));

    /// <summary>Refuses a scene that cannot be run.</summary>
    /// <exception cref="ArgumentException">What is wrong, with the value and what is allowed.</exception>
    public void Validate()
    {
        Require(SoundSpeed > 0 && double.IsFinite(SoundSpeed), $"the sound speed {SoundSpeed} m/s is not positive");
        Require(Frequencies.Count > 0, "a scene needs at least one bin");
        for (int f = 0; f < Frequencies.Count; f++)
            Require(Frequencies[f] > (f == 0 ? 0 : Frequencies[f - 1]), $"bin {f} at {Frequencies[f]} Hz: bins are positive and ascend");
        Require(SnapshotIntervalSeconds > 0 && double.IsFinite(SnapshotIntervalSeconds), $"the snapshot interval {SnapshotIntervalSeconds} s is not positive");
        Require(SnapshotsPerFrame >= 1, $"{SnapshotsPerFrame} snapshots do not make a frame");
        Require(ShapeStepSeconds > 0, $"the shape step {ShapeStepSeconds} s is not positive");
        Require(Responses.Count == 0 || Responses.Count == Geometry.Count, $"{Responses.Count} responses for {Geometry.Count} channels");
        Require(Misplacements.Count == 0 || Misplacements.Count == Geometry.Count, $"{Misplacements.Count} misplacements for {Geometry.Count} channels");
        foreach (Fault fault in Faults)
        {
            foreach (int c in fault.Channels)
                Require(c >= 0 && c < Geometry.Count, $"the {fault.Kind} fault names channel {c} of {Geometry.Count}");
        }
    }

    private static void Require(bool condition, string message)
    {
        if (!condition) throw new ArgumentException(message);
    }
}
