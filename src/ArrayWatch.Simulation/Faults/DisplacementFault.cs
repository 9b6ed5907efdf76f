using ArrayWatch.Signals;

namespace ArrayWatch.Simulation.Faults;

/// <summary>Sensors that are not where the configuration says.</summary>
public sealed record DisplacementFault : Fault
{
    /// <summary>True place minus configured place, metres.</summary>
    public required Position Displacement { get; init; }

    /// <inheritdoc/>
    public override string Kind => "geometry";
}
