using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Web.Api;

/// <summary>One array in the list of arrays.</summary>
/// <param name="Id">Id in topics and addresses.</param>
/// <param name="Channels">Number of channels.</param>
/// <param name="Bins">Number of frequency bins; 0 before the first frame.</param>
/// <param name="LastFrame">Event time of the last frame; null before the first.</param>
/// <param name="LastArrival">When the last frame arrived, by the server's clock; null before the first.</param>
/// <param name="Standing">"waiting", "starting", "healthy", "degraded", "field-not-understood" or "silent".</param>
/// <param name="Counts">Channels by standing.</param>
/// <param name="OpenAlerts">Alerts that stand.</param>
/// <param name="SoundSpeed">Sound speed in use, m/s.</param>
/// <param name="Labels">Labels of the channels, index 0 first.</param>
/// <param name="Frequencies">Bin centres, Hz.</param>
public sealed record ArraySummary(
    string Id, int Channels, int Bins, DateTimeOffset? LastFrame, DateTimeOffset? LastArrival, string Standing,
    IReadOnlyDictionary<Standing, int> Counts, int OpenAlerts, double SoundSpeed, IReadOnlyList<string> Labels, IReadOnlyList<double> Frequencies)
{
    internal static ArraySummary Of(ArrayOverview array) => new(
        array.Id, array.Geometry.Count, array.Frequencies.Count, array.LastFrame, array.LastArrival, array.Standing,
        array.Counts, array.OpenAlerts, array.SoundSpeed, [.. array.Geometry.Channels.Select(static c => c.Label)], array.Frequencies);
}
