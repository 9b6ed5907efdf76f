using ArrayWatch.Detection;
using ArrayWatch.Detection.Beams;
using ArrayWatch.Signals;

namespace ArrayWatch.Monitoring;

/// <summary>One array as the validated configuration has it. Immutable.</summary>
public sealed record ArrayDefinition
{
    /// <summary>Id in topics and addresses.</summary>
    public required string Id { get; init; }

    /// <summary>Its channels.</summary>
    public required ArrayGeometry Geometry { get; init; }

    /// <summary>What the sound travels in.</summary>
    public required Medium Medium { get; init; }

    /// <summary>Fast memory.</summary>
    public TimeSpan TimeConstant { get; init; } = TimeSpan.FromSeconds(60);

    /// <summary>Slow memory.</summary>
    public TimeSpan SlowTimeConstant { get; init; } = TimeSpan.FromSeconds(1800);

    /// <summary>Names of the noise-field components.</summary>
    public IReadOnlyList<string> FieldComponents { get; init; } = ["isotropic", "plane-waves", "channel-noise"];

    /// <summary>How far a channel may be off.</summary>
    public Tolerances Tolerances { get; init; } = new();

    /// <summary>False-alert budget, for this array and a month of 30 days.</summary>
    public double FalseAlertsPerMonth { get; init; } = 1;

    /// <summary>True when the publisher uses e^{−jωt}: data are conjugated as they arrive.</summary>
    public bool ConjugatePhase { get; init; }

    /// <summary>Directions in which array gain is reported.</summary>
    public IReadOnlyList<LookDirection> LookDirections { get; init; } = [];

    /// <summary>Wall-clock time without a frame after which the stream is said to be silent.</summary>
    public TimeSpan SilenceLimit { get; init; } = TimeSpan.FromSeconds(60);
}

/// <summary>What the sound travels in: a given speed, or what it follows from.</summary>
public abstract record Medium
{
    /// <summary>Speed given by the user, m/s.</summary>
    public sealed record Given(double SoundSpeed) : Medium;

    /// <summary>Sea water: °C, practical salinity, metres.</summary>
    public sealed record SeaWater(double Temperature, double Salinity, double Depth) : Medium;

    /// <summary>Air: °C, % relative humidity, kPa.</summary>
    public sealed record Air(double Temperature, double Humidity, double Pressure) : Medium;
}
