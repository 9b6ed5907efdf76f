using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Alerts;
using ArrayWatch.Monitoring.Mapping;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Monitoring;

/// <summary>An array's standing in a word, and its channels counted by theirs. Pure.</summary>
internal static class ArrayStanding
{
    /// <summary>The word, worst news first.</summary>
    /// <param name="begun">Whether a frame has come.</param>
    /// <param name="silent">Whether frames have stopped.</param>
    /// <param name="diagnosis">The last decision; null before the first.</param>
    /// <param name="openAlerts">Every alert that is not back to normal.</param>
    public static string Word(bool begun, bool silent, Diagnosis? diagnosis, IReadOnlyList<AlertEvent> openAlerts)
    {
        if (!begun) return "waiting";
        if (silent) return "silent";
        if (diagnosis is not { Ready: true }) return "starting";
        if (!diagnosis.Field.Understood) return "field-not-understood";
        bool degraded = diagnosis.Channels.Any(c => c.Standing is Standing.Suspect or Standing.Faulty)
            || openAlerts.Any(a => HealthMapper.Stands(a) && a.Kind != AlertCondition.StreamKind);
        return degraded ? "degraded" : "healthy";
    }

    /// <summary>Channels by standing; those before the first decision are unknown.</summary>
    public static IReadOnlyDictionary<Standing, int> Count(int channels, HealthReport? health) =>
        Enum.GetValues<Standing>().ToDictionary(
            s => s, s => health is null ? (s == Standing.Unknown ? channels : 0) : health.Channels.Count(c => c.Standing == s));
}
