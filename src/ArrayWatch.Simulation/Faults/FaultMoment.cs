namespace ArrayWatch.Simulation.Faults;

/// <summary>What a fault may know as it acts on one bin of one snapshot.</summary>
public readonly ref struct FaultMoment
{
    /// <summary>Seconds since the scene's start.</summary>
    public required double SceneSeconds { get; init; }

    /// <summary>0-based bin.</summary>
    public required int Bin { get; init; }

    /// <summary>Bin centre, hertz.</summary>
    public required double FrequencyHertz { get; init; }

    /// <summary>Mean power of the field at a sensor with every level curve at 0 dB, unit².</summary>
    public required double FieldPower { get; init; }

    /// <summary>Source of the fault's own noise.</summary>
    public required RandomNumbers Random { get; init; }
}
