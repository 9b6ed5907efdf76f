namespace ArrayWatch.Simulation.Faults;

/// <summary>A digitiser whose clock runs slow against the others: its channels grow late by so much for every second.</summary>
public sealed record ClockDriftFault : Fault
{
    /// <summary>Drift, parts per million; positive when the channels grow late.</summary>
    public required double DriftPartsPerMillion { get; init; }

    /// <inheritdoc/>
    public override string Kind => "clock-drift";

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
        double delay = DriftPartsPerMillion * 1e-6 * (moment.SceneSeconds - StartSeconds);
        (double s, double c) = Math.SinCos(-2 * Math.PI * moment.FrequencyHertz * delay);
        foreach (int n in Channels) Multiply(n, c, s, re, im);
    }
}
