namespace ArrayWatch.NoiseField.Calibration;

/// <summary>Standard errors of an array's calibration; infinite where the field carries no information.</summary>
/// <param name="Phase">One a channel, in the unit of the phase parameter: radians, or seconds for a delay.</param>
/// <param name="LogGain">One a channel, nepers (1 neper is 8.686 dB).</param>
public sealed record CalibrationErrors(double[] Phase, double[] LogGain);
