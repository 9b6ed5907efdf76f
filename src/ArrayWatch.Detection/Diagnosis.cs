using ArrayWatch.Detection.Beams;

namespace ArrayWatch.Detection;

/// <summary>Everything that one decision says of an array. Immutable.</summary>
public sealed record Diagnosis
{
    /// <summary>Event time of the decision, seconds since 1970.</summary>
    public required double TimeSeconds { get; init; }

    /// <summary>Effective degrees of freedom of the estimate that was judged.</summary>
    public required double DegreesOfFreedom { get; init; }

    /// <summary>False in the start-up period, when nothing is raised.</summary>
    public required bool Ready { get; init; }

    /// <summary>The noise field.</summary>
    public required FieldAssessment Field { get; init; }

    /// <summary>One a channel, index 0 first.</summary>
    public required IReadOnlyList<ChannelAssessment> Channels { get; init; }

    /// <summary>The faults that stand now: a fault that is not in the list has returned to normal.</summary>
    public required IReadOnlyList<Finding> Findings { get; init; }

    /// <summary>What to apply, one a channel.</summary>
    public required IReadOnlyList<ChannelCorrection> Corrections { get; init; }

    /// <summary>Array gain in each look direction.</summary>
    public required IReadOnlyList<BeamAssessment> Beams { get; init; }
}
