using ArrayWatch.Detection;

namespace ArrayWatch.Monitoring.Reports;

/// <summary>A whole array's standing: the retained health message.</summary>
public sealed record HealthReport
{
    /// <summary>Event time.</summary>
    public required DateTimeOffset Time { get; init; }

    /// <summary>Id of the array.</summary>
    public required string Array { get; init; }

    /// <summary>Frames folded in since the service started.</summary>
    public required long Frames { get; init; }

    /// <summary>Snapshots folded in since the service started.</summary>
    public required long Snapshots { get; init; }

    /// <summary>Sequence number of the last frame; null before the first.</summary>
    public required ulong? LastSequence { get; init; }

    /// <summary>Messages refused since the service started, by reason.</summary>
    public required IReadOnlyDictionary<string, long> Refused { get; init; }

    /// <summary>The noise field.</summary>
    public required FieldReport Field { get; init; }

    /// <summary>Ids of the alerts that stand.</summary>
    public required IReadOnlyList<string> Alerts { get; init; }

    /// <summary>Each channel's standing.</summary>
    public required IReadOnlyList<ChannelReport> Channels { get; init; }

    /// <summary>False in the start-up period, when nothing is raised.</summary>
    public required bool Ready { get; init; }

    /// <summary>Effective degrees of freedom of the fast memory.</summary>
    public required double DegreesOfFreedom { get; init; }
}

/// <summary>The field part of a health report.</summary>
/// <param name="Misfit">Residual power not explained, 0 to 1.</param>
/// <param name="SoundSpeed">m/s.</param>
/// <param name="Understood">False when the model fits too badly to name channels.</param>
/// <param name="Components">Each component's share of the power.</param>
public sealed record FieldReport(double? Misfit, double SoundSpeed, bool Understood, IReadOnlyDictionary<string, double> Components);

/// <summary>One channel's part of a health report; null where the data cannot tell.</summary>
public sealed record ChannelReport
{
    /// <summary>0-based index.</summary>
    public required int Index { get; init; }

    /// <summary>What people call it.</summary>
    public required string Label { get; init; }

    /// <summary>What may be done with its data.</summary>
    public required Standing Standing { get; init; }

    /// <summary>Mean power over the bins, dB.</summary>
    public double? LevelDecibels { get; init; }

    /// <summary>Standard error of <see cref="LevelDecibels"/>.</summary>
    public double? LevelDecibelsStandardError { get; init; }

    /// <summary>Amplitude against the field's, dB.</summary>
    public double? GainDecibels { get; init; }

    /// <summary>Standard error of <see cref="GainDecibels"/>.</summary>
    public double? GainDecibelsStandardError { get; init; }

    /// <summary>Phase error, degrees.</summary>
    public double? PhaseDegrees { get; init; }

    /// <summary>Standard error of <see cref="PhaseDegrees"/>.</summary>
    public double? PhaseDegreesStandardError { get; init; }

    /// <summary>Time error, microseconds.</summary>
    public double? DelayMicroseconds { get; init; }

    /// <summary>Standard error of <see cref="DelayMicroseconds"/>.</summary>
    public double? DelayMicrosecondsStandardError { get; init; }

    /// <summary>Incoherent noise above what the field explains, dB.</summary>
    public double? ExcessDecibels { get; init; }

    /// <summary>Standard error of <see cref="ExcessDecibels"/>.</summary>
    public double? ExcessDecibelsStandardError { get; init; }
}
