namespace ArrayWatch.Monitoring.Reports;

/// <summary>N×N coherence of one bin as measured and as the model has it. Row-major; row l, column m is S[l,m]/√(S[l,l]·S[m,m]).</summary>
public sealed record CoherencePicture
{
    /// <summary>Event time.</summary>
    public required DateTimeOffset Time { get; init; }

    /// <summary>Bin centre, Hz.</summary>
    public required double Frequency { get; init; }

    /// <summary>"fast" or "slow".</summary>
    public required string Scale { get; init; }

    /// <summary>Number of channels, N.</summary>
    public required int Channels { get; init; }

    /// <summary>Measured magnitude, 0 to 1; N² values.</summary>
    public required float[] Magnitude { get; init; }

    /// <summary>Measured phase, degrees; N² values.</summary>
    public required float[] PhaseDegrees { get; init; }

    /// <summary>The model's magnitude; empty when there is no fit yet.</summary>
    public required float[] ModelMagnitude { get; init; }

    /// <summary>The model's phase, degrees; empty when there is no fit yet.</summary>
    public required float[] ModelPhaseDegrees { get; init; }

    /// <summary>Distance between channels l and m, metres; N² values.</summary>
    public required float[] SeparationMetres { get; init; }
}
