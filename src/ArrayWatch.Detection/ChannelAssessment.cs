using ArrayWatch.Signals;

namespace ArrayWatch.Detection;

/// <summary>What the data say of one channel; null where they cannot tell.</summary>
/// <param name="Index">0-based index in the array.</param>
/// <param name="Standing">What may be done with its data.</param>
/// <param name="LevelDecibels">Mean power over the bins, dB re 1 unit² of the publisher.</param>
/// <param name="GainDecibels">Amplitude against what the field says it should be, dB.</param>
/// <param name="PhaseDegrees">Phase common to all bins, degrees.</param>
/// <param name="DelayMicroseconds">Time error; positive when the channel is late.</param>
/// <param name="ExcessDecibels">Power above what the field and the array's usual self-noise explain, dB.</param>
public sealed record ChannelAssessment(
    int Index,
    Standing Standing,
    Measured? LevelDecibels,
    Measured? GainDecibels,
    Measured? PhaseDegrees,
    Measured? DelayMicroseconds,
    Measured? ExcessDecibels);
