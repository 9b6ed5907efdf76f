using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.Live;
using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Pages;

/// <summary>The alerts, with filters.</summary>
public partial class AlertsPage : LiveComponent
{
    private const int Limit = 100;

    private IReadOnlyList<AlertEvent> _alerts = [];
    private string? _array = "";
    private string? _state = "open";
    private string? _span = "";
    private string? _error;
    private string _headline = "";
    private int _waiting;
    private int _standing;

    /// <summary>Only this array's, at first.</summary>
    [Parameter, SupplyParameterFromQuery(Name = "array")]
    public string? Array { get; set; }

    /// <summary>Only this state's, at first; "open" or empty for all.</summary>
    [Parameter, SupplyParameterFromQuery(Name = "state")]
    public string? State { get; set; }

    [Inject]
    internal IHistory History { get; set; } = null!;

    /// <inheritdoc/>
    protected override void OnInitialized()
    {
        _array = Array ?? "";
        _state = State ?? "open";
    }

    /// <inheritdoc/>
    protected override async Task LoadAsync()
    {
        IReadOnlyList<AlertEvent> open = Fleet.OpenAlerts;
        _waiting = open.Count(static a => AlertStateWords.NeedsAcknowledging(a.State));
        _standing = open.Count(AlertStateWords.Stands);
        _headline = _waiting == 0 ? "Every alert is acknowledged" : _waiting == 1 ? "1 alert waits for acknowledgement" : $"{_waiting} alerts wait for acknowledgement";
        if (open.Count == 0) _headline = "No open alerts";

        string? array = string.IsNullOrEmpty(_array) ? null : _array;
        AlertState? state = AlertStateWords.Parse(_state ?? "");
        DateTimeOffset? from = string.IsNullOrEmpty(_span) ? null : Now - TrendSpan.Find(_span).Length;
        IEnumerable<AlertEvent> live = open.Where(a => (array is null || a.Array == array) && (state is null || a.State == state) && (from is null || a.Raised >= from));
        IReadOnlyList<AlertEvent> stored = [];
        if (_state != "open")
        {
            try
            {
                stored = await History.AlertsAsync(array, state, from, null, Limit, Gone);
                _error = null;
            }
            catch (Exception e) when (StoreTrouble.Is(e))
            {
                _error = StoreTrouble.Sentence;
            }
        }
        HashSet<string> openIds = [.. open.Select(static a => a.Id)];
        _alerts = [.. AlertList.Merge(live, stored.Where(a => state is null || !openIds.Contains(a.Id)), urgentFirst: _state == "open").Take(Limit)];
    }

    private string[] Labels(string array) =>
        [.. Fleet.Arrays.FirstOrDefault(a => a.Id == array)?.Geometry.Channels.Select(static c => c.Label) ?? []];
}
