namespace ArrayWatch.Detection;

/// <summary>How far a channel may be off before it is called faulty. Set by the user.</summary>
public sealed record Tolerances
{
    /// <summary>Amplitude, dB either way.</summary>
    /// <value>Positive. Default 3.</value>
    public double GainDecibels { get; init; } = 3;

    /// <summary>Phase, degrees either way.</summary>
    /// <value>Between 0 and 90, exclusive. Default 15.</value>
    public double PhaseDegrees { get; init; } = 15;

    /// <summary>Time error, microseconds either way.</summary>
    /// <value>Positive. Default 50.</value>
    public double DelayMicroseconds { get; init; } = 50;

    /// <summary>Incoherent noise above what the field explains, dB.</summary>
    /// <value>Positive. Default 6.</value>
    public double ExcessDecibels { get; init; } = 6;
}
