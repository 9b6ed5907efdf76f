namespace ArrayWatch.Simulation.Faults;

/// <summary>Something wrong with channels between two scene times. Immutable.</summary>
public abstract record Fault
{
    /// <summary>The public contract's word for it.</summary>
    public abstract string Kind { get; }

    /// <summary>The channels that are wrong, ascending, 0-based; empty when it is about the stream.</summary>
    public required IReadOnlyList<int> Channels { get; init; }

    /// <summary>Scene time at which it begins, seconds.</summary>
    public double StartSeconds { get; init; }

    /// <summary>Scene time at which it ends, seconds; infinite for never.</summary>
    public double EndSeconds { get; init; } = double.PositiveInfinity;

    /// <summary>True while it acts.</summary>
    public virtual bool IsActive(double sceneSeconds) => sceneSeconds >= StartSeconds && sceneSeconds < EndSeconds;

    /// <summary>Acts on what the sensor hears, before the channel's self-noise comes in.</summary>
    /// <param name="moment">Time, bin, field power.</param>
    /// <param name="re">N real parts, changed in place.</param>
    /// <param name="im">N imaginary parts, changed in place.</param>
    public virtual void OnSound(FaultMoment moment, Span<double> re, Span<double> im)
    {
    }

    /// <summary>Acts on the signal with its self-noise: wiring, digitising, order.</summary>
    /// <param name="moment">Time, bin, field power.</param>
    /// <param name="re">N real parts, changed in place.</param>
    /// <param name="im">N imaginary parts, changed in place.</param>
    public virtual void OnSignal(FaultMoment moment, Span<double> re, Span<double> im)
    {
    }

    /// <summary>Multiplies one channel by (factorRe + j factorIm).</summary>
    private protected static void Multiply(int channel, double factorRe, double factorIm, Span<double> re, Span<double> im)
    {
        (re[channel], im[channel]) =
            ((re[channel] * factorRe) - (im[channel] * factorIm), (re[channel] * factorIm) + (im[channel] * factorRe));
    }
}
