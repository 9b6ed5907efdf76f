using ArrayWatch.Detection;
using ArrayWatch.Signals;
using ArrayWatch.Simulation;
using ArrayWatch.Simulation.Faults;

namespace ArrayWatch.Trials;

/// <summary>How far the last decision's estimate of a fault's size was from the truth.</summary>
/// <param name="Error">Estimate minus truth.</param>
/// <param name="StandardError">What the estimate claims.</param>
/// <param name="Unit">Unit of both.</param>
internal sealed record EstimateError(double Error, double StandardError, string Unit)
{
    /// <summary>Null when the fault has no single size, or the decision gives no estimate.</summary>
    public static EstimateError? Of(TrialOutcome outcome)
    {
        if (outcome.Case.Fault is not { Channels.Count: 1 } fault) return null;
        ChannelAssessment channel = outcome.Last.Channels[fault.Channels[0]];
        ChannelResponse response = outcome.Case.Scene.Responses[fault.Channels[0]];
        return fault switch
        {
            GainFault f => From(channel.GainDecibels, f.GainDecibels + response.GainDecibels, "dB"),
            PhaseFault f => From(channel.PhaseDegrees, f.PhaseDegrees + response.PhaseDegrees, "°"),
            DelayFault f => From(channel.DelayMicroseconds, f.DelayMicroseconds, "µs"),
            ExcessNoiseFault f => From(channel.ExcessDecibels, f.ExcessDecibels, "dB"),
            _ => null,
        };
    }

    private static EstimateError? From(Measured? estimate, double truth, string unit) =>
        estimate is { } e ? new EstimateError(e.Value - truth, e.StandardError, unit) : null;
}
