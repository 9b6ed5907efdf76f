namespace ArrayWatch.Monitoring.Reports;

/// <summary>Values of every metric at one time.</summary>
/// <param name="Channels">By metric name ("levelDecibels", "gainDecibels", "phaseDegrees", "delayMicroseconds",
/// "excessDecibels"): one value a channel, NaN where the data cannot tell.</param>
/// <param name="Field">By metric name ("misfit", "soundSpeed", "degreesOfFreedom", "conventionalGainLossDecibels",
/// "adaptiveGainLossDecibels", …): one value for the array.</param>
public sealed record MetricSet(IReadOnlyDictionary<string, float[]> Channels, IReadOnlyDictionary<string, double> Field);
