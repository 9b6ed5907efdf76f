using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.Live;
using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Pages;

/// <summary>One array: its open alerts, where its channels are and what the data say of each.</summary>
public partial class ArrayPage : LiveComponent
{
    private ArrayOverview? _overview;
    private HealthReport? _health;
    private IReadOnlyList<string> _labels = [];
    private IReadOnlyList<Standing> _standings = [];
    private IReadOnlyList<AlertEvent> _alerts = [];
    private IReadOnlyList<ChannelRow> _rows = [];
    private bool _byIndex;

    /// <summary>Id of the array.</summary>
    [Parameter]
    public string Id { get; set; } = "";

    /// <inheritdoc/>
    protected override Task LoadAsync()
    {
        _overview = Fleet.Arrays.FirstOrDefault(a => a.Id == Id);
        if (_overview is null) return Task.CompletedTask;
        _health = Fleet.Health(Id);
        _labels = [.. _overview.Geometry.Channels.Select(static c => c.Label)];
        _standings = _health?.Channels.OrderBy(static c => c.Index).Select(static c => c.Standing).ToArray() ?? [];
        _alerts = AlertList.Merge(Fleet.OpenAlerts.Where(a => a.Array == Id), [], urgentFirst: true);
        Sort(_byIndex);
        return Task.CompletedTask;
    }

    private void Sort(bool byIndex)
    {
        _byIndex = byIndex;
        _rows = ChannelRow.Of(_overview!.Geometry, _health, byIndex);
    }
}
