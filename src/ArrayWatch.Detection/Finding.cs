namespace ArrayWatch.Detection;

/// <summary>A fault that the evidence confirms, as of one decision. Immutable.</summary>
public sealed record Finding
{
    /// <summary>One of the trade's words for what is wrong: "dead", "swap", "phase", ….</summary>
    public required string Kind { get; init; }

    /// <summary>The channels it is about, ascending, 0-based; empty when it is about the stream or the whole array.</summary>
    public required IReadOnlyList<int> Indices { get; init; }

    /// <summary>The module or connector whose channels failed together; null for none.</summary>
    public string? Group { get; init; }

    /// <summary>When it began, as the evidence has it: seconds since 1970, event time.</summary>
    public required double OnsetSeconds { get; init; }

    /// <summary>Probability that it is so, 0 to 1.</summary>
    public required double Confidence { get; init; }

    /// <summary>
    /// Estimates by their name in the public contract ("phaseDegrees", "mapping", …): each a double,
    /// an array of doubles, or a dictionary from index to index.
    /// </summary>
    public required IReadOnlyDictionary<string, object> Estimate { get; init; }

    /// <summary>Kinds that this array and field cannot tell from <see cref="Kind"/>; empty for none.</summary>
    public IReadOnlyList<string> Alternatives { get; init; } = [];

    /// <summary>Why there are alternatives, or what else a person should know; null for nothing.</summary>
    public string? Reason { get; init; }

    /// <summary>A suspected cause ("near 50 Hz mains or a harmonic"); null for none.</summary>
    public string? Cause { get; init; }

    /// <summary>Numbers that a person can check, by a short readable name with its unit.</summary>
    public IReadOnlyDictionary<string, double> Evidence { get; init; } = new Dictionary<string, double>();

    /// <summary>True when the two findings speak of one fault: same kind, same channels.</summary>
    public bool IsSameFaultAs(Finding other)
    {
        ArgumentNullException.ThrowIfNull(other);
        return Kind == other.Kind && Indices.SequenceEqual(other.Indices);
    }
}
