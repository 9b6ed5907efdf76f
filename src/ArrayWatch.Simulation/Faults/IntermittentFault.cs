namespace ArrayWatch.Simulation.Faults;

/// <summary>A fault that comes and goes: a loose connector.</summary>
public sealed record IntermittentFault : Fault
{
    /// <summary>What is wrong while it is there; its own times are not looked at.</summary>
    public required Fault Inner { get; init; }

    /// <summary>From one onset to the next, seconds, positive.</summary>
    public required double PeriodSeconds { get; init; }

    /// <summary>Share of the time that it is there, 0 to 1.</summary>
    public required double DutyCycle { get; init; }

    /// <inheritdoc/>
    public override string Kind => "intermittent";

    /// <summary>Wraps a fault, which keeps its channels.</summary>
    public static IntermittentFault Of(Fault inner, double periodSeconds, double dutyCycle)
    {
        ArgumentNullException.ThrowIfNull(inner);
        return new() { Channels = inner.Channels, Inner = inner, PeriodSeconds = periodSeconds, DutyCycle = dutyCycle };
    }

    /// <inheritdoc/>
    public override bool IsActive(double sceneSeconds)
    {
        if (!base.IsActive(sceneSeconds)) return false;
        double turns = (sceneSeconds - StartSeconds) / PeriodSeconds;
        return turns - Math.Floor(turns) < DutyCycle;
    }

    /// <inheritdoc/>
    public override void OnSound(FaultMoment moment, Span<double> re, Span<double> im) => Inner.OnSound(moment, re, im);

    /// <inheritdoc/>
    public override void OnSignal(FaultMoment moment, Span<double> re, Span<double> im) => Inner.OnSignal(moment, re, im);
}
