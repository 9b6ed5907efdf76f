using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Monitoring.Hosting;

/// <summary>What readers see of one array. Immutable, replaced whole.</summary>
/// <param name="Overview">At a glance.</param>
/// <param name="Health">As of the last decision; null before the first.</param>
/// <param name="Corrections">As of the last decision; null before the first.</param>
/// <param name="OpenAlerts">Every alert that is not back to normal, newest raised first.</param>
internal sealed record ArrayView(
    ArrayOverview Overview, HealthReport? Health, CorrectionReport? Corrections, IReadOnlyList<AlertEvent> OpenAlerts);
