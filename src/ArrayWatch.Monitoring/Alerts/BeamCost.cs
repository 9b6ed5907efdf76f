using ArrayWatch.Detection.Beams;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>What the array's beams have lost, dB: healthy less as found, in the worst look direction. Pure.</summary>
internal static class BeamCost
{
    public const string Conventional = "conventional";
    public const string Adaptive = "adaptive";

    /// <summary>By beamformer; null when no look direction is configured or nothing has been judged yet.</summary>
    public static IReadOnlyDictionary<string, double>? Of(IReadOnlyList<BeamAssessment> beams) =>
        beams.Count == 0
            ? null
            : new Dictionary<string, double>
            {
                [Conventional] = beams.Max(b => Loss(b.Conventional)),
                [Adaptive] = beams.Max(b => Loss(b.Adaptive)),
            };

    private static double Loss(BeamGains gains) => gains.HealthyDecibels - gains.FoundDecibels;
}
