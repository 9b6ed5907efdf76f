using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Signals;

namespace ArrayWatch.Web.ViewModels;

/// <summary>One line of the channel table, as text.</summary>
public sealed record ChannelRow(
    int Index, string Label, string? Group, Standing Standing, string Level, string Gain, string Phase, string Delay, string Excess)
{
    /// <summary>Lines of every channel; before the first decision all are unknown.</summary>
    /// <param name="geometry">The array.</param>
    /// <param name="health">Its last report; null for none.</param>
    /// <param name="byIndex">True for array order, false for the most urgent first.</param>
    public static IReadOnlyList<ChannelRow> Of(ArrayGeometry geometry, HealthReport? health, bool byIndex)
    {
        ArgumentNullException.ThrowIfNull(geometry);
        Dictionary<int, ChannelReport> reports = health?.Channels.ToDictionary(static c => c.Index) ?? [];
        IEnumerable<ChannelRow> rows = Enumerable.Range(0, geometry.Count).Select(i => Of(i, geometry.Channels[i], reports.GetValueOrDefault(i)));
        return byIndex ? [.. rows] : [.. rows.OrderBy(static r => Urgency(r.Standing)).ThenBy(static r => r.Index)];
    }

    private static ChannelRow Of(int index, Channel channel, ChannelReport? r) => new(
        index, channel.Label, channel.Group, r?.Standing ?? Standing.Unknown,
        NumberText.WithError(r?.LevelDecibels, r?.LevelDecibelsStandardError, 1, signed: false),
        NumberText.WithError(r?.GainDecibels, r?.GainDecibelsStandardError, 2),
        NumberText.WithError(r?.PhaseDegrees, r?.PhaseDegreesStandardError, 1),
        NumberText.WithError(r?.DelayMicroseconds, r?.DelayMicrosecondsStandardError, 1),
        NumberText.WithError(r?.ExcessDecibels, r?.ExcessDecibelsStandardError, 1));

    private static int Urgency(Standing standing)
    {
        for (int i = 0; i < StandingWords.MostUrgentFirst.Count; i++)
        {
            if (StandingWords.MostUrgentFirst[i] == standing) return i;
        }
        return StandingWords.MostUrgentFirst.Count;
    }
}
