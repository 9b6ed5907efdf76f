using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Web.Live;
using ArrayWatch.Web.ViewModels;

namespace ArrayWatch.Web.Pages;

/// <summary>Every array at a glance.</summary>
public partial class FleetPage : LiveComponent
{
    private readonly Dictionary<string, IReadOnlyList<Standing>> _standings = new(StringComparer.Ordinal);
    private Headline _headline = new(HeadlineTone.NoData, "", "");
    private string _title = "ArrayWatch";

    /// <inheritdoc/>
    protected override Task LoadAsync()
    {
        foreach (ArrayOverview array in Fleet.Arrays)
            _standings[array.Id] = Fleet.Health(array.Id)?.Channels.OrderBy(static c => c.Index).Select(static c => c.Standing).ToArray() ?? [];
        _headline = FleetHeadline.Of([.. Fleet.Arrays.Select(a => (a.Id, Headline.Of(a, Fleet.OpenAlerts, Now)))]);
        _title = _headline.Tone == HeadlineTone.Good ? "ArrayWatch" : $"{_headline.Text} · ArrayWatch";
        return Task.CompletedTask;
    }

    private static string[] Labels(ArrayOverview array) => [.. array.Geometry.Channels.Select(static c => c.Label)];

    private static bool IsOld(ArrayOverview array) => array.Standing == "silent";
}
