using ArrayWatch.Detection;
using ArrayWatch.Signals;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;

namespace ArrayWatch.Trials;

/// <summary>One drawn trial: the truth, and what the diagnosis is told of the array.</summary>
internal sealed record TrialCase
{
    /// <summary>Name of the kind of trial.</summary>
    public required string Name { get; init; }

    /// <summary>Start value that this trial can be drawn again from.</summary>
    public required ulong StartValue { get; init; }

    /// <summary>What plays.</summary>
    public required Scene Scene { get; init; }

    /// <summary>What is wrong; null for a healthy scene.</summary>
    public required Fault? Fault { get; init; }

    /// <summary>Sound speed that the configuration states, m/s.</summary>
    public required double ConfiguredSoundSpeed { get; init; }

    /// <summary>What the user says of the array.</summary>
    public required DiagnosisOptions Options { get; init; }

    /// <summary>A line for a person: the array, its field, the fault.</summary>
    public required string Description { get; init; }

    /// <summary>The array as configured.</summary>
    public ArrayGeometry Geometry => Scene.Geometry;
}
