using System.Globalization;
using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.Live;
using ArrayWatch.Web.ViewModels;
using Microsoft.AspNetCore.Components;

namespace ArrayWatch.Web.Pages;

/// <summary>The coherence of every pair of channels, as measured and as expected, now or as kept.</summary>
public partial class CoherencePage : LiveComponent
{
    /// <summary>Five charts are much to send: they follow the data at this pace, ages each second.</summary>
    private static readonly TimeSpan _pace = TimeSpan.FromSeconds(5);

    private static readonly TimeSpan _keptFor = TimeSpan.FromDays(7);
    private ArrayOverview? _overview;
    private IReadOnlyList<CoherenceEntry> _entries = [];
    private CoherencePicture? _picture;
    private CoherenceCharts? _charts;
    private DateTimeOffset _nextLive;
    private DateTimeOffset _nextEntries;
    private string _frequency = "";
    private string _scale = "fast";
    private string _entry = "";
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
        if (_frequency.Length == 0 && _overview.Frequencies is { Count: > 0 } bins)
            _frequency = bins[bins.Count / 2].ToString("R", CultureInfo.InvariantCulture);
        if (Now >= _nextEntries)
        {
            _nextEntries = Now.AddMinutes(1);
            await LoadEntriesAsync();
        }
        if (_entry.Length == 0 && Now >= _nextLive) await ShowAsync();
    }

    private async Task LoadEntriesAsync()
    {
        DateTimeOffset end = (_overview?.LastFrame ?? Now).AddMinutes(1);
        try
        {
            _entries = [.. (await History.CoherenceEntriesAsync(Id, end - _keptFor, end, Gone)).Take(500)];
            _error = null;
        }
        catch (Exception e) when (StoreTrouble.Is(e))
        {
            _error = StoreTrouble.Sentence;
        }
    }

    private async Task ShowAsync()
    {
        _nextLive = Now + _pace;
        if (long.TryParse(_entry, NumberStyles.None, CultureInfo.InvariantCulture, out long entry))
        {
            try
            {
                _picture = await History.CoherenceAsync(Id, entry, Gone);
                _error = _picture is null ? "This picture is no longer kept." : null;
            }
            catch (Exception e) when (StoreTrouble.Is(e))
            {
                _error = StoreTrouble.Sentence;
            }
        }
        else
        {
            _picture = double.TryParse(_frequency, CultureInfo.InvariantCulture, out double frequency) ? Fleet.Coherence(Id, frequency, _scale) : null;
        }
        HashSet<int> marked = [.. Fleet.Health(Id)?.Channels.Where(static c => c.Standing is Standing.Faulty or Standing.Suspect).Select(static c => c.Index) ?? []];
        string[] labels = [.. _overview?.Geometry.Channels.Select(static c => c.Label) ?? []];
        _charts = _picture is { } picture && picture.Channels == labels.Length ? CoherenceCharts.Of(picture, labels, marked.Contains) : null;
    }
}
