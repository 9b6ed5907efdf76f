using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Web.Charts;
using ArrayWatch.Web.Live;
using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Pages;

/// <summary>How a metric went, from the last hour to the last year.</summary>
public partial class TrendsPage : LiveComponent
{
    private const int GridPoints = 240;
    private const int LinePoints = 600;

    private static readonly TimeSpan _pace = TimeSpan.FromSeconds(15);
    private ArrayOverview? _overview;
    private TrendMetric _metric = TrendMetric.Known[0];
    private string _metricKey = TrendMetric.Known[0].Key;
    private string _spanKey = TrendSpan.All[0].Key;
    private int _channel = -1;
    private DateTimeOffset _from;
    private DateTimeOffset _to;
    private DateTimeOffset _next;
    private ChartSpec? _grid;
    private ChartSpec? _line;
    private double _limit;
    private string? _error;

    /// <summary>Id of the array.</summary>
    [Parameter]
    public string Id { get; set; } = "";

    [Inject]
    internal IHistory History { get; set; } = null!;

    /// <inheritdoc/>
    protected override async Task LoadAsync()
    {
        _overview = Fleet.Arrays.FirstOrDefault(a => a.Id == Id);
        if (_overview is null) return;

        // The first channel that needs a person is the one to look at.
        if (_channel < 0) _channel = Fleet.Health(Id)?.Channels.Where(static c => c.Standing is Standing.Faulty or Standing.Suspect).Select(static c => (int?)c.Index).FirstOrDefault() ?? 0;
        if (Now >= _next) await ShowAsync();
    }

    private async Task ShowAsync()
    {
        if (_overview is null) return;
        _next = Now + _pace;
        _metric = TrendMetric.Find(_metricKey) ?? TrendMetric.Known[0];
        _to = (_overview.LastFrame ?? Now).AddSeconds(1);
        _from = _to - TrendSpan.Find(_spanKey).Length;
        string[] labels = [.. _overview.Geometry.Channels.Select(static c => c.Label)];
        try
        {
            TrendGridView? grid = _metric.PerChannel
                ? TrendGridView.Of(await History.TrendGridAsync(Id, _metric.Key, _from, _to, GridPoints, Gone), labels, _metric.IsDeviation)
                : null;
            _limit = grid?.Limit ?? 0;
            _grid = grid is null ? null : TrendCharts.Grid(grid, _metric);
            int? channel = _metric.PerChannel ? _channel : null;
            _line = TrendCharts.Line(await History.TrendAsync(Id, _metric.Key, channel, _from, _to, LinePoints, Gone), _metric,
                channel is { } c ? labels[c] : "the whole array");
            _error = null;
        }
        catch (Exception e) when (StoreTrouble.Is(e))
        {
            _error = StoreTrouble.Sentence;
        }
    }
}
