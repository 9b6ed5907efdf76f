namespace ArrayWatch.Detection.Beams;

/// <summary>Array gain in one look direction, dB, averaged over the bins.</summary>
/// <param name="Look">The direction.</param>
/// <param name="Conventional">Delay-and-sum beam.</param>
/// <param name="Adaptive">MVDR beam with the stated diagonal loading.</param>
public sealed record BeamAssessment(LookDirection Look, BeamGains Conventional, BeamGains Adaptive);

/// <summary>Array gain of one beamformer, dB.</summary>
/// <param name="HealthyDecibels">With every channel right.</param>
/// <param name="FoundDecibels">With the channels as they are and nothing applied.</param>
/// <param name="CorrectedDecibels">After the published corrections.</param>
public sealed record BeamGains(double HealthyDecibels, double FoundDecibels, double CorrectedDecibels);
