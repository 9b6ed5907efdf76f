using ArrayWatch.Detection.Beams;

namespace ArrayWatch.Detection;

/// <summary>What the user says of one array that the diagnosis needs.</summary>
public sealed record DiagnosisOptions
{
    /// <summary>How far a channel may be off.</summary>
    public Tolerances Tolerances { get; init; } = new();

    /// <summary>Alerts without a cause that the user accepts, for each array and month of 30 days.</summary>
    /// <value>Positive. Default 1.</value>
    public double FalseAlertsPerMonth { get; init; } = 1;

    /// <summary>Names of the noise-field components to fit; unknown names are refused by the field registry.</summary>
    public IReadOnlyList<string> FieldComponents { get; init; } = ["isotropic", "plane-waves", "channel-noise"];

    /// <summary>Memory of the fast estimate, seconds.</summary>
    /// <value>Positive. Default 60.</value>
    public double TimeConstantSeconds { get; init; } = 60;

    /// <summary>Directions in which array gain is reported.</summary>
    public IReadOnlyList<LookDirection> LookDirections { get; init; } = [];
}
