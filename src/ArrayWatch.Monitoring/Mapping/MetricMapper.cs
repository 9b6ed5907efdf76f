using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Alerts;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;
using ArrayWatch.Signals;

namespace ArrayWatch.Monitoring.Mapping;

/// <summary>A decision as values for trends. Pure.</summary>
internal static class MetricMapper
{
    /// <summary>Maps one decision.</summary>
    public static MetricSet Map(Diagnosis diagnosis, StreamTally stream, int standingAlerts)
    {
        Dictionary<string, double> field = new()
        {
            ["misfit"] = diagnosis.Field.Misfit ?? double.NaN,
            ["soundSpeed"] = diagnosis.Field.SoundSpeed,
            ["degreesOfFreedom"] = diagnosis.DegreesOfFreedom,
            ["standingAlerts"] = standingAlerts,
            ["framesMissing"] = stream.MissingFrames,
            ["messagesRefused"] = stream.Refused.Sum(),
            ["transientSnapshots"] = stream.Transients,
        };
        if (BeamCost.Of(diagnosis.Beams) is { } cost)
        {
            field["conventionalGainLossDecibels"] = cost[BeamCost.Conventional];
            field["adaptiveGainLossDecibels"] = cost[BeamCost.Adaptive];
        }

        return new MetricSet(
            new Dictionary<string, float[]>
            {
                ["levelDecibels"] = Channels(diagnosis, c => c.LevelDecibels),
                ["gainDecibels"] = Channels(diagnosis, c => c.GainDecibels),
                ["phaseDegrees"] = Channels(diagnosis, c => c.PhaseDegrees),
                ["delayMicroseconds"] = Channels(diagnosis, c => c.DelayMicroseconds),
                ["excessDecibels"] = Channels(diagnosis, c => c.ExcessDecibels),
            },
            field);
    }

    private static float[] Channels(Diagnosis diagnosis, Func<ChannelAssessment, Measured?> pick) =>
        [.. diagnosis.Channels.Select(c => pick(c) is { } m ? (float)m.Value : float.NaN)];
}
