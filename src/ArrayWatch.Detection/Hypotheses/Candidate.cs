namespace ArrayWatch.Detection.Hypotheses;

/// <summary>One explanation of what one decision sees. Immutable.</summary>
internal sealed record Candidate
{
    public required string Kind { get; init; }

    /// <summary>Channels, ascending.</summary>
    public required IReadOnlyList<int> Indices { get; init; }

    /// <summary>
    /// Evidence of this decision alone that the error is beyond tolerance: log-likelihood ratio to an error just at tolerance, nats.
    /// </summary>
    public required double Nats { get; init; }

    public required IReadOnlyDictionary<string, object> Estimate { get; init; }

    public IReadOnlyDictionary<string, double> Evidence { get; init; } = new Dictionary<string, double>();

    public IReadOnlyList<string> Alternatives { get; init; } = [];

    public string? Reason { get; init; }

    public string? Cause { get; init; }

    /// <summary>The module whose channels failed together; null for none.</summary>
    public string? Group { get; init; }

    /// <summary>The estimate that a lasting fault keeps, in units of its tolerance; NaN for kinds without one.</summary>
    public double Size { get; init; } = double.NaN;

    /// <summary>Tells this fault from others of its kind over time; the channels unless the kind says otherwise.</summary>
    public string? Identity { get; init; }

    public string Key => $"{Kind}:{Identity ?? string.Join(',', Indices)}";
}
