using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Web.Api;

/// <summary>One alert with all that is known of it.</summary>
/// <param name="Alert">As of its last change.</param>
/// <param name="History">Every change, oldest first.</param>
/// <param name="Audit">Who did what to it, oldest first.</param>
public sealed record AlertDetail(AlertEvent Alert, IReadOnlyList<AlertEvent> History, IReadOnlyList<AuditEntry> Audit);
