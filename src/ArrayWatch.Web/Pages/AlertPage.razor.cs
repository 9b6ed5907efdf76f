using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.Live;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Pages;

/// <summary>One alert with its changes and its audit log.</summary>
public partial class AlertPage : LiveComponent
{
    private AlertEvent? _alert;
    private IReadOnlyList<AlertEvent> _changes = [];
    private IReadOnlyList<AuditEntry> _audit = [];
    private IReadOnlyList<string> _labels = [];
    private string? _error;

    /// <summary>Id of the alert.</summary>
    [Parameter]
    public string Id { get; set; } = "";

    [Inject]
    internal IHistory History { get; set; } = null!;

    /// <inheritdoc/>
    protected override async Task LoadAsync()
    {
        AlertEvent? live = Fleet.OpenAlerts.FirstOrDefault(a => a.Id == Id);
        try
        {
            _changes = await History.AlertHistoryAsync(Id, Gone);
            _audit = await History.AuditLogAsync(Id, Gone);
            _error = null;
        }
        catch (Exception e) when (StoreTrouble.Is(e))
        {
            _error = StoreTrouble.Sentence;
        }
        _alert = live ?? (_changes.Count > 0 ? _changes[^1] : null);
        _labels = [.. Fleet.Arrays.FirstOrDefault(a => a.Id == _alert?.Array)?.Geometry.Channels.Select(static c => c.Label) ?? []];
    }
}
