namespace ArrayWatch.Simulation.Faults;

/// <summary>
/// A pole where none belongs: the amplitude of 1/(1 + jf/f₀)ᵐ (low-pass: water in a connector) or
/// 1/(1 + f₀/jf)ᵐ (high-pass: a leaking preamplifier).
/// </summary>
public sealed record RollOffFault : Fault
{
    /// <summary>Corner f₀, hertz, positive.</summary>
    public required double CornerHertz { get; init; }

    /// <summary>Order m, at least 1.</summary>
    public int Order { get; init; } = 1;

    /// <summary>True when the low frequencies are lost rather than the high.</summary>
    public bool LosesLowFrequencies { get; init; }

    /// <summary>False leaves the phase alone.</summary>
    public bool TurnsPhase { get; init; } = true;

    /// <inheritdoc/>
    public override string Kind => "rolloff";

    /// <summary>Complex response at a frequency.</summary>
    public System.Numerics.Complex ResponseAt(double frequencyHertz)
    {
        System.Numerics.Complex pole = LosesLowFrequencies
            ? new(1, -CornerHertz / frequencyHertz)
            : new(1, frequencyHertz / CornerHertz);
        System.Numerics.Complex response = 1;
        for (int i = 0; i < Order; i++) response /= pole;
        return TurnsPhase ? response : response.Magnitude;
    }

    /// <inheritdoc/>
    public override void OnSound(FaultMoment moment, Span<double> re, Span<double> im)
    {
        System.Numerics.Complex h = ResponseAt(moment.FrequencyHertz);
        foreach (int n in Channels) Multiply(n, h.Real, h.Imaginary, re, im);
    }
}
